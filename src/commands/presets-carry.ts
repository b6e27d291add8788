import { resolve } from 'node:path';
import { plainScanner } from '../calc/scanner.js';
import { type CarryAim, carryFields } from '../search/carry.js';
import { canCarry, carriedDraft, carryStudy } from '../search/carry-study.js';
import { saveNewPreset } from '../store/save-new-preset.js';
import type { Study } from '../study/study.js';
import { type Attempt, wrongUse } from './attempt.js';
import { type ChosenScanner, chooseScanner } from './choose-scanner.js';
import type { CommandIo } from './command-io.js';
import type { CommandRequest } from './command-request.js';
import { complain } from './complain.js';
import { type ExitCode, exitCodes } from './exit-codes.js';
import { loadJudgedPreset } from './load-judged-preset.js';
import { refusedByStore } from './load-preset.js';
import { pageOf } from './page.js';
import { carryJson } from './presets-carry-json.js';
import { carryPage } from './presets-carry-page.js';
import { readField } from './read-named-numbers.js';

/** `holdfast presets carry`: a study at another field or on another scanner, as a proposal; `--out` writes it as a draft. */
export async function runPresetsCarry(request: CommandRequest, io: CommandIo): Promise<ExitCode> {
  const loaded = await loadJudgedPreset(request.arguments[0] ?? '', request, io);
  if (!loaded.ok) return complain(loaded, io);
  const { study, rules, filed } = loaded.value;
  const target = await readTarget(request, io, study);
  if (!target.ok) return complain(target, io);
  const aim = (request.value('equal') ?? 'contrast') as CarryAim;
  const carried = carryStudy(study, { from: plainScanner(study.fieldT), to: target.value.scanner, aim, rules });
  const out = request.value('out');
  const draft = out === undefined ? null : carriedDraft(carried, filed);
  const path = out === undefined ? null : resolve(io.workingFolder, out);
  if (draft !== null && path !== null) {
    const saved = await saveNewPreset(io.disk, path, draft);
    if (!saved.ok) return complain(refusedByStore(saved.problems), io);
  }
  const written = draft === null || path === null ? null : { id: draft.id, path };
  if (request.has('json')) io.write(carryJson(carried, target.value.file?.name ?? null, written));
  else {
    const page = pageOf(request, io);
    io.write(page.plain(carryPage(carried, target.value.file?.name ?? null, written, page)));
  }
  return exitCodes.done;
}

/** Where to: a field or a scanner, one of them, within the fields that the model's sources reach. */
async function readTarget(request: CommandRequest, io: CommandIo, study: Study): Promise<Attempt<ChosenScanner>> {
  const { min, max } = carryFields;
  if (request.has('to') === request.has('scanner')) {
    const what = request.has('to') ? '--to and --scanner both say where to' : 'where to is missing';
    return wrongUse('--to', `${what[0]?.toUpperCase()}${what.slice(1)}.`, 'Write --to 3, or --scanner NAME.');
  }
  if (!canCarry(study.fieldT)) {
    return wrongUse(
      'PRESET',
      `Preset ${study.id} is for ${study.fieldT} T; a preset is carried between ${min} and ${max} T.`,
      'Carry another preset.',
    );
  }
  const field = readField(request.value('to'), '--to');
  if (!field.ok) return field;
  const chosen = await chooseScanner(request, io, study, field.value ?? study.fieldT);
  if (!chosen.ok) return chosen;
  const { fieldT } = chosen.value.scanner;
  if (canCarry(fieldT)) return chosen;
  const option = request.has('to') ? '--to' : '--scanner';
  return wrongUse(
    option,
    `${option} asks for ${fieldT} T; a preset is carried between ${min} and ${max} T.`,
    'The tissue table and the SAR range have no sources beyond.',
  );
}
