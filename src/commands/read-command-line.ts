import { parseArgs } from 'node:util';
import { cleanText } from '../study/clean-text.js';
import { nearestWord } from '../study/nearest-word.js';
import { type Attempt, wrongUse } from './attempt.js';
import type { CommandRequest } from './command-request.js';
import type { CommandRow, OptionRow } from './command-row.js';
import { bareOptions, commandTable, everywhere } from './command-table.js';

/** What the person asked for. */
export type CommandLine =
  | { readonly kind: 'interface'; readonly request: CommandRequest }
  | { readonly kind: 'version' }
  | { readonly kind: 'help'; readonly command: CommandRow | null; readonly group: string | null }
  | { readonly kind: 'command'; readonly command: CommandRow; readonly request: CommandRequest };

const allOptions: readonly OptionRow[] = [...bareOptions, ...commandTable.flatMap((command) => command.options)];

/** The commands whose words begin with these. */
function commandsOf(words: readonly string[]): CommandRow[] {
  return commandTable.filter((command) => words.every((word, i) => command.words[i] === word));
}

function quoted(text: string): string {
  return `"${cleanText(text, 60)}"`;
}

/** "Did you mean": the nearest known word, or the known words. */
function suggestion(word: string, known: readonly string[], shown: (name: string) => string): string {
  const near = nearestWord(word, known);
  return near === null ? `Known: ${known.map(shown).join(', ')}.` : `Did you mean ${shown(near)}?`;
}

/**
 * Reads a command line by the table of commands: POSIX and GNU forms, `--option VALUE` and `--option=VALUE`, `--` ends options.
 * Unknown words come back with the nearest known one.
 */
export function readCommandLine(args: readonly string[]): Attempt<CommandLine> {
  const { tokens } = parseArgs({
    args: [...args],
    options: {
      ...Object.fromEntries(
        allOptions.map(({ name, value }) => [name, { type: value === null ? ('boolean' as const) : ('string' as const) }]),
      ),
      help: { type: 'boolean', short: 'h' },
    },
    strict: false,
    allowPositionals: true,
    tokens: true,
  });
  const words: string[] = [];
  const given = new Map<string, string[]>();
  for (const token of tokens) {
    if (token.kind === 'positional') words.push(token.value);
    if (token.kind === 'option') given.set(token.name, [...(given.get(token.name) ?? []), token.value ?? '']);
  }
  const called = findCommand(words);
  // A misspelt option turns its value into a word: that is told before an unknown command is.
  const unknown = tokens.find((token) => token.kind === 'option' && !allOptions.some(({ name }) => name === token.name));
  if (!called.ok) return unknown?.kind === 'option' ? (optionProblem(unknown, bareOptions, null, given) ?? called) : called;
  const command = called.value;
  const options = command === null ? bareOptions : [...everywhere, ...command.options];

  for (const token of tokens) {
    if (token.kind !== 'option') continue;
    const wrong = optionProblem(token, options, command, given);
    if (wrong !== null) return wrong;
  }
  if (given.has('version')) return { ok: true, value: { kind: 'version' } };
  if (given.has('help')) return { ok: true, value: { kind: 'help', command, group: command === null ? (words[0] ?? null) : null } };

  const rest = words.slice(command?.words.length ?? 0);
  if (command === null && rest.length > 0) return missingSecondWord(rest[0] as string);
  const request: CommandRequest = {
    arguments: rest,
    has: (option) => given.has(option),
    value: (option) => given.get(option)?.at(-1),
    values: (option) => given.get(option) ?? [],
  };
  if (command === null) return { ok: true, value: { kind: 'interface', request } };
  const wrong = argumentProblem(rest, command);
  return wrong ?? { ok: true, value: { kind: 'command', command, request } };
}

/** The command that the words name; null for none (the interface, or the help of a group of commands). */
function findCommand(words: readonly string[]): Attempt<CommandRow | null> {
  const [first, second] = words;
  if (first === undefined) return { ok: true, value: null };
  const group = commandsOf([first]);
  if (group.length === 0) {
    const known = [...new Set(commandTable.map((command) => command.words[0] as string))];
    const hint = first === 'help' || first === 'version' ? `Did you mean --${first}?` : suggestion(first, known, (name) => name);
    return wrongUse(first, `There is no command ${quoted(first)}.`, hint);
  }
  const single = group.find((command) => command.words.length === 1);
  if (single !== undefined) return { ok: true, value: single };
  if (second === undefined) return { ok: true, value: null };
  const found = group.find((command) => command.words[1] === second);
  if (found !== undefined) return { ok: true, value: found };
  const known = group.map((command) => command.words[1] as string);
  return wrongUse(
    second,
    `There is no command "${first} ${cleanText(second, 60)}".`,
    suggestion(second, known, (name) => `${first} ${name}`),
  );
}

function missingSecondWord(first: string): Attempt<never> {
  const known = commandsOf([first]).map((command) => command.words.join(' '));
  return wrongUse(first, `"${first}" alone is no command.`, `Known: ${known.join(', ')}.`);
}

type OptionToken = {
  readonly name: string;
  readonly rawName: string;
  readonly value: string | undefined;
  readonly inlineValue: boolean | undefined;
};

function optionProblem(
  token: OptionToken,
  options: readonly OptionRow[],
  command: CommandRow | null,
  given: ReadonlyMap<string, readonly string[]>,
): Attempt<never> | null {
  const row = options.find(({ name }) => name === token.name);
  const raw = cleanText(token.rawName, 60);
  if (row === undefined) {
    const where = command === null ? '' : ` in "${command.words.join(' ')}"`;
    return wrongUse(
      raw,
      `There is no option ${raw}${where}.`,
      suggestion(
        token.name,
        options.map(({ name }) => name),
        (name) => `--${name}`,
      ),
    );
  }
  if (row.value === null) {
    return token.value === undefined
      ? null
      : wrongUse(raw, `${raw} takes no value, ${quoted(token.value)} was given.`, `Write ${raw} alone.`);
  }
  if (token.value === undefined || token.value === '') {
    return wrongUse(raw, `${raw} needs a value.`, `Write ${raw} ${row.value}.`);
  }
  if (row.choices !== undefined && !row.choices.includes(token.value)) {
    return wrongUse(raw, `${raw} takes ${row.choices.join(', ')}; ${quoted(token.value)} was given.`, 'Use one of these.');
  }
  if (row.repeats !== true && (given.get(row.name)?.length ?? 0) > 1) {
    return wrongUse(raw, `${raw} was given more than once.`, 'Give it once.');
  }
  return null;
}

function argumentProblem(rest: readonly string[], command: CommandRow): Attempt<never> | null {
  const call = ['holdfast', ...command.words, ...command.arguments.map(({ name, required }) => (required ? name : `[${name}]`))].join(' ');
  const missing = command.arguments.filter(({ required }) => required)[rest.length];
  if (missing !== undefined) return wrongUse(missing.name, `${missing.name} is missing.`, `Write ${call}.`);
  if (rest.some((word) => word === '')) return wrongUse('', 'An argument is empty.', `Write ${call}.`);
  const takesAll = command.arguments.some(({ repeats }) => repeats === true);
  const extra = takesAll ? undefined : rest[command.arguments.length];
  return extra === undefined ? null : wrongUse(extra, `${quoted(extra)} is one word too many.`, `Write ${call}.`);
}
