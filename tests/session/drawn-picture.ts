import { readdirSync, readFileSync } from 'node:fs';
import { type DrawnPictures, drawPictures, type PictureProblem } from '../../src/picture/picture-problem.js';
import { pictureProblemOf } from '../../src/session/picture-view.js';
import type { State } from '../../src/session/state.js';
import { update } from '../../src/session/update.js';
import { readObjectFile } from '../../src/study/read-object-file.js';
import { press, sessionOn } from './invented-state.js';

const objects = readdirSync('objects').map((name) => {
  const read = readObjectFile(readFileSync(`objects/${name}`, 'utf8'), name);
  if (!read.ok) throw new Error(name);
  return read.value;
});

const drawn = new Map<string, DrawnPictures>();

/** The pictures of a problem, drawn once for each. */
export function picturesOf(problem: PictureProblem): DrawnPictures {
  const key = JSON.stringify([problem.region, problem.preset.parameters, problem.parameters, problem.body]);
  const known = drawn.get(key);
  if (known !== undefined) return known;
  const object = objects.find(({ regions }) => regions.includes(problem.region));
  if (object === undefined) throw new Error(`no object for ${problem.region}`);
  const made = drawPictures(problem, object);
  if (!made.ok) throw new Error(made.problems[0]?.message);
  drawn.set(key, made.value);
  return made.value;
}

/** Answers the picture that is open, as the worker does. */
export function withPicture(state: State): State {
  const problem = pictureProblemOf(state);
  if (problem === null || state.picture === null) throw new Error('no picture was asked for');
  return update(state, { kind: 'answer', ask: state.picture.ask, answer: { kind: 'pictures', pictures: picturesOf(problem) } })[0];
}

/** The same where it could not be drawn. */
export function pictureFailed(state: State): State {
  const problems = [
    { code: 'nothing-to-draw', path: '', message: 'There is no picture: TE is not shorter than TR.', hint: 'Change the timing.' },
  ];
  return update(state, { kind: 'answer', ask: state.picture?.ask ?? -1, answer: { kind: 'failed', problems } })[0];
}

/** A problem that is quickly drawn, with its object. */
export function knownProblem(): { readonly problem: PictureProblem; readonly object: (typeof objects)[number] } {
  const dwi = press(sessionOn('liver-3t'), 'p', '11', 'enter', 'escape', 'end', 'enter', 's');
  const problem = pictureProblemOf(dwi);
  const object = objects.find(({ id }) => id === 'liver');
  if (problem === null || object === undefined) throw new Error('no session');
  return { problem, object };
}
