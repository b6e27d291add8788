import { resolve } from 'node:path';
import { draftOfHeaders, type HeaderDraft, type SeriesToDraft } from '../headers/draft-of-headers.js';
import { type ReadSeries, readSeries } from '../headers/read-series.js';
import { SeriesCollector } from '../headers/series-collector.js';
import { type HeadersRead, readHeaders } from '../store/dicom/read-headers.js';
import type { StoreProblem } from '../store/problem-of-error.js';
import { saveNewPreset } from '../store/save-new-preset.js';
import { type Attempt, refuse, wrongUse } from './attempt.js';
import type { CommandIo } from './command-io.js';
import type { CommandRequest } from './command-request.js';
import { complain } from './complain.js';
import { type ExitCode, exitCodes } from './exit-codes.js';
import { refusedByStore } from './load-preset.js';
import { pageOf } from './page.js';
import { explainJson, explainPage } from './read-explain.js';
import { readJson } from './read-json.js';
import { readField } from './read-named-numbers.js';
import { readPage } from './read-page.js';
import { readTyped, type TypedForSeries } from './read-typed.js';

/** Problems of one kind beyond this are counted instead of named. */
const mostNamed = 100;

/** Everything that reading gave: what `read` prints. */
export interface ReadResult {
  readonly counts: HeadersRead;
  readonly problems: readonly StoreProblem[];
  /** Problems that were counted and not kept, by code. */
  readonly more: ReadonlyMap<string, number>;
  readonly series: readonly SeriesToDraft[];
  /** Of the series that were picked. */
  readonly draft: HeaderDraft;
  readonly picked: ReadonlySet<string>;
  readonly written: { readonly id: string; readonly path: string } | null;
}

/** `holdfast read`: headers of objects and sidecars, series by series, to a draft preset. */
export async function runRead(request: CommandRequest, io: CommandIo): Promise<ExitCode> {
  if (request.has('explain')) {
    const page = pageOf(request, io);
    io.write(request.has('json') ? explainJson() : page.plain(explainPage(page)));
    return exitCodes.done;
  }
  if (request.arguments.length === 0) {
    return complain(wrongUse('FILE', 'FILE is missing.', 'Write holdfast read FILE..., name a folder, or use --explain.'), io);
  }
  const field = readField(request.value('field'), '--field');
  if (!field.ok) return complain(field, io);
  const found = await collect(request.arguments, io);
  if (found.counts.read === 0) return complain(nothingRead(found), io);
  const typed = readTyped(request, found.collector.series());
  if (!typed.ok) return complain(typed, io);
  const series = seriesOf(found.collector, typed.value);
  const picked = pickedOf(request, series);
  if (!picked.ok) return complain(picked, io);
  const draft = draftOfHeaders(
    series.filter(({ read }) => picked.value.has(read.id)),
    field.value ?? undefined,
  );
  const out = request.value('out');
  let written: ReadResult['written'] = null;
  if (out !== undefined) {
    if (draft.study === null) {
      sayProblems(found, io);
      return complain(nothingToWrite(draft, series, picked.value), io);
    }
    const path = resolve(io.workingFolder, out);
    const saved = await saveNewPreset(io.disk, path, draft.study);
    if (!saved.ok) return complain(refusedByStore(saved.problems), io);
    written = { id: draft.study.id, path };
  }
  const { counts, problems, more } = found;
  const result: ReadResult = { counts, problems, more, series, draft, picked: picked.value, written };
  const page = pageOf(request, io);
  io.write(request.has('json') ? readJson(result) : page.plain(readPage(result, page)));
  sayProblems(found, io);
  return problems.length > 0 || (written !== null && draft.leftOut.length > 0) ? exitCodes.failed : exitCodes.done;
}

interface Collected {
  readonly collector: SeriesCollector;
  readonly counts: HeadersRead;
  readonly problems: readonly StoreProblem[];
  readonly more: ReadonlyMap<string, number>;
}

async function collect(paths: readonly string[], io: CommandIo): Promise<Collected> {
  const collector = new SeriesCollector();
  const problems: StoreProblem[] = [];
  const kinds = new Map<string, number>();
  const more = new Map<string, number>();
  const counts = await readHeaders(
    io.disk,
    paths.map((path) => resolve(io.workingFolder, path)),
    {
      header: (header) => collector.add(header),
      problem: (problem) => {
        const count = (kinds.get(problem.code) ?? 0) + 1;
        kinds.set(problem.code, count);
        if (count <= mostNamed) problems.push(problem);
        else more.set(problem.code, count - mostNamed);
      },
      progress: (files) => {
        if (files % 50 === 0) io.progress?.(`reading headers: ${files} files`);
      },
    },
  );
  io.progress?.('');
  return { collector, counts, problems, more };
}

function nothingRead({ problems, counts }: Collected) {
  const [first] = problems;
  if (first !== undefined) return { ok: false, exit: problems.length > 1 ? exitCodes.failed : first.exitCode, problems } as const;
  return refuse(exitCodes.badData, {
    code: 'no-headers',
    path: '',
    message: `No DICOM object and no sidecar among ${counts.files} files.`,
    hint: 'Name the folder that holds them.',
  });
}

function nothingToWrite({ leftOut }: HeaderDraft, series: readonly SeriesToDraft[], picked: ReadonlySet<string>) {
  const unpicked = series.map(({ read }) => read.id).filter((id) => !picked.has(id));
  const aside = unpicked.map((id) => `${id}: made from other images or not picked, --series ${id} picks it`);
  const reasons = [...leftOut.map(({ id, why }) => `${id}: ${why}`), ...aside].slice(0, 20).join('; ');
  return refuse(exitCodes.failed, {
    code: 'nothing-to-draft',
    path: '--out',
    message: `Nothing was written: no series is whole (${reasons}).`,
    hint: 'Type what is missing with --set SERIES:KEY=VALUE and --class SERIES:CLASS.',
  });
}

function seriesOf(collector: SeriesCollector, typed: readonly TypedForSeries[]): readonly SeriesToDraft[] {
  return collector.series().map((one, i) => {
    const own = typed[i] as TypedForSeries;
    return { read: readSeries(one, own.id, own.key ?? undefined), typed: own.values };
  });
}

/** The series of the draft: those that were named, else all that hold images of their own. */
function pickedOf(request: CommandRequest, series: readonly SeriesToDraft[]): Attempt<ReadonlySet<string>> {
  const ids = series.map(({ read }) => read.id);
  const named = request.values('series');
  const unknown = named.find((id) => !ids.includes(id));
  if (unknown !== undefined) {
    return refuse(exitCodes.noInput, {
      code: 'series-not-there',
      path: '--series',
      message: `No series "${unknown.slice(0, 20)}" was read.`,
      hint: `There are: ${ids.slice(0, 20).join(', ')}.`,
    });
  }
  const own = series.filter(({ read }: { read: ReadSeries }) => !read.isDerived).map(({ read }) => read.id);
  return { ok: true, value: new Set(named.length > 0 ? named : own) };
}

function sayProblems({ problems, more, counts }: Collected, io: CommandIo): void {
  for (const { message, hint } of problems) io.complain(`holdfast: ${message} ${hint}\n`);
  for (const [code, count] of more) io.complain(`holdfast: ${count} more of the kind ${code}.\n`);
  const all = problems.length + [...more.values()].reduce((sum, count) => sum + count, 0);
  if (all > 0) io.complain(`holdfast: ${counts.read} of ${counts.files} files read, ${all} ${all === 1 ? 'problem' : 'problems'}.\n`);
}
