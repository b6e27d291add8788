import { readQuantity } from '../../formulas/read-quantity.js';
import { carryAims, carryFields } from '../../search/carry.js';
import { canCarry, carriedDraft } from '../../search/carry-study.js';
import { freeText } from '../../study/record-text.js';
import type { Study } from '../../study/study.js';
import { type CarryTarget, type CarryView, carryTargets, firstTarget, sayTarget, withCarry } from '../carry.js';
import { carryLines, carryRow } from '../carry-rows.js';
import { type Change, type Command, neighbour, only, open, pointAt, say } from '../change.js';
import { filedStudy, judgedStudy } from '../judged-study.js';
import type { Answer } from '../message.js';
import { revisionRow } from '../preset-rows.js';
import type { State } from '../state.js';

/** Opens the carry screen on a preset, as its file has it, and asks for its rules to be read. */
function carryPreset(state: State, filed: Study, seriesId: string): Change {
  const { min, max } = carryFields;
  if (!canCarry(filed.fieldT))
    return only(say(state, `${filed.id} is for ${filed.fieldT} T: presets are carried between ${min} and ${max} T`, 'trouble'));
  const { study } = judgedStudy(filed, state.siteRules);
  const rules = study.series.flatMap(({ mustKeep }) => mustKeep).filter(({ rule, when }) => rule !== undefined || when !== undefined);
  const known = state.carry?.filed === filed ? state.carry : null;
  const view: CarryView = {
    filed,
    study,
    rules: rules.length === 0 ? new Map() : null,
    target: known?.target ?? firstTarget(state, study),
    aim: known?.aim ?? 'contrast',
    seriesId: study.series.some(({ id }) => id === seriesId) ? seriesId : (study.series[0]?.id ?? ''),
    carried: null,
    trouble: null,
  };
  const shown = pointAt(open(withCarry(state, view), 'carry'), 'to');
  if (rules.length === 0) return only(shown);
  const ask = state.asks + 1;
  return [{ ...shown, asks: ask, open: { ...shown.open, carryRules: ask } }, [{ kind: 'read-rules', ask, mustKeeps: rules }]];
}

/** Carries the preset of the session. */
export const carryOpened: Command = (state) =>
  state.opened === null ? only(state) : carryPreset(state, filedOf(state.opened), state.place.seriesId);

/** The study of a session by the object that holds it: asked for again, it is the same one. */
const filedOnes = new WeakMap<object, Study>();

function filedOf(opened: NonNullable<State['opened']>): Study {
  const filed = filedOnes.get(opened) ?? filedStudy(opened);
  filedOnes.set(opened, filed);
  return filed;
}

/** Carries the revision under the hand. */
export const carryRevision: Command = (state) => {
  const row = revisionRow(state);
  return row === undefined ? only(state) : carryPreset(state, row.study, '');
};

export const moveInCarry =
  (by: number): Command =>
  (state) => {
    const here = carryRow(state)?.field;
    return only(pointAt({ ...state, notice: null }, neighbour(carryLines(state), ({ field }) => field === here, by)?.field ?? 'to'));
  };

/** Turns what the hand is on: where to, the coil, what is held equal, which series. */
export const turnCarry =
  (by: -1 | 1): Command =>
  (state, key) => {
    const { carry } = state;
    const field = carryRow(state)?.field;
    if (carry === null) return only(state);
    if (field === 'to') return only(turned(state, { ...carry, target: nextTarget(state, carry.target, by) }));
    if (field === 'coil') return only(turned(state, { ...carry, target: nextCoil(carry.target, by) }));
    if (field === 'equal') return only(turned(state, { ...carry, aim: neighbour(carryAims, (aim) => aim === carry.aim, by) ?? carry.aim }));
    if (field === 'series') return turnCarried(by)(state, key);
    return only(say(state, 'Nothing to change here: w says why, n is the next series'));
  };

function turned(state: State, carry: CarryView): State {
  const before = state.carry;
  if (before !== null && before.aim === carry.aim && sayTarget(before.target) === sayTarget(carry.target))
    return say(state, 'No further this way');
  return { ...withCarry(state, carry), notice: null };
}

function nextTarget(state: State, target: CarryTarget, by: -1 | 1): CarryTarget {
  const targets = carryTargets(state);
  const same = (one: CarryTarget) =>
    'fieldT' in one
      ? 'fieldT' in target && one.fieldT === target.fieldT
      : 'choice' in target && one.choice.file?.name === target.choice.file?.name;
  if (targets.some(same)) return neighbour(targets, same, by) ?? target;
  // A typed field lies between those of the list.
  const fieldT = 'fieldT' in target ? target.fieldT : (target.choice.file?.fieldT ?? 0);
  const fields = targets.filter((one) => 'fieldT' in one && (by > 0 ? one.fieldT > fieldT : one.fieldT < fieldT));
  return (by > 0 ? (fields[0] ?? targets.find((one) => 'choice' in one)) : fields.at(-1)) ?? target;
}

function nextCoil(target: CarryTarget, by: -1 | 1): CarryTarget {
  if ('fieldT' in target) return target;
  const { file, coil } = target.choice;
  const next = neighbour(file?.coils ?? [], ({ name }) => name === coil, by);
  return { choice: { file, coil: next?.name ?? coil } };
}

/** The next or previous series; the hand stays on its line where that has one. */
export const turnCarried =
  (by: number): Command =>
  (state) => {
    const { carry } = state;
    if (carry === null) return only(state);
    const { series } = carry.study;
    const at = series.findIndex(({ id }) => id === carry.seriesId);
    const next = series[(at + by + series.length) % series.length];
    return only({ ...state, notice: null, carry: { ...carry, seriesId: next?.id ?? carry.seriesId } });
  };

/** A digit begins to type a field, from whatever line. */
export const typeCarry: Command = (state, key) => only(typed(state, key.text ?? ''));

function typed(state: State, text: string): State {
  return { ...pointAt(state, 'to'), notice: null, entry: { field: 'to', text, ask: null, isText: false } };
}

/** Enter begins to type the field, turns a choice, else explains. */
export const enterCarry: Command = (state, key) => {
  const row = carryRow(state);
  if (row?.field === 'to') return only(typed(state, ''));
  if (row?.kind !== 'choice') return whyCarried(state, key);
  const forward = turnCarry(1)(state, key);
  return forward[0].carry === state.carry ? turnCarry(-1)(state, key) : forward;
};

/** Takes a typed field. */
export function takeCarryField(state: State, text: string): State {
  const { carry } = state;
  const closed = { ...state, entry: null };
  if (carry === null || text.trim() === '') return closed;
  const read = readQuantity(text, 'T');
  const { min, max } = carryFields;
  if (!read.ok || !canCarry(read.value))
    return say(state, `${freeText(text, 20)} was given, expected ${min} to ${max} T: the sources reach no further`, 'trouble');
  return { ...withCarry(closed, { ...carry, target: { fieldT: read.value } }), notice: null };
}

/** Explains the line under the hand. */
export const whyCarried: Command = (state) =>
  only(state.carry?.carried == null ? say(state, 'It is being worked out') : pointAt(open(state, 'why'), '0'));

/** Saves what comes out as a draft preset: a person reviews and releases it. */
export const saveCarried: Command = (state) => {
  const { carry } = state;
  if (carry?.carried == null) return only(say(state, carry?.trouble ?? 'It is being worked out', 'trouble'));
  if (state.open.preset !== undefined) return only(say(state, 'The draft is being saved'));
  const ask = state.asks + 1;
  const study = carriedDraft(carry.carried, carry.filed);
  return [
    say({ ...state, asks: ask, open: { ...state.open, preset: ask } }, 'Saving the proposal as a draft preset'),
    [{ kind: 'save-preset', ask, study }],
  ];
};

/** An answer to something that the carry screen asked. */
export function takeCarryAnswer(state: State, answer: Answer, failed: string | null): State {
  const { carry } = state;
  if (carry === null) return state;
  if (answer.kind === 'rules') return { ...state, carry: { ...carry, rules: answer.rules } };
  if (answer.kind === 'carried') return { ...state, carry: { ...carry, carried: answer.carried } };
  // Rules that cannot be read are not checked, and say so; the rest is worked out.
  if (carry.rules === null)
    return say({ ...state, carry: { ...carry, rules: new Map() } }, failed ?? 'The rules could not be read', 'trouble');
  return { ...state, carry: { ...carry, trouble: failed ?? 'It could not be worked out' } };
}
