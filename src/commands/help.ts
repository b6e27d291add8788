import { wrapText } from '../session/wrap-text.js';
import type { CommandRow, OptionRow } from './command-row.js';
import { bareOptions, commandTable, everywhere, usageOf } from './command-table.js';

const width = 80;

/** Help of the program: examples first. */
export function programHelp(): string {
  const commands = commandTable.map((command) => [command.words.join(' '), command.summary] as const);
  return [
    'holdfast: fit an MRI session to the patient, and see what each change costs',
    '',
    'Examples',
    '  holdfast                                 open the interface',
    '  holdfast figures liver-3t                the running order and its figures',
    '  holdfast figures liver-3t t1-3d --set sliceThicknessMm=4',
    '',
    'Commands',
    ...twoColumns(commands),
    '',
    'Options everywhere',
    ...optionLines(bareOptions),
    '',
    'holdfast COMMAND --help says more. Without a terminal, and without a command,',
    'the demo session is printed.',
    '',
    'Exit codes: 0 done, 1 a check failed, 64 wrong use, 65 bad data, 66 no such',
    'preset, series or file, 70 our own fault, 73 cannot create, 74 reading or',
    'writing failed, 78 bad settings.',
    '',
  ].join('\n');
}

/** Help of the commands that share a first word. */
export function groupHelp(group: string): string {
  const commands = commandTable.filter((command) => command.words[0] === group);
  return [...twoColumns(commands.map((command) => [`holdfast ${command.words.join(' ')}`, command.summary] as const)), ''].join('\n');
}

/** Help of one command: examples first. */
export function commandHelp(command: CommandRow): string {
  return [
    ...wrapText(`holdfast ${command.words.join(' ')}: ${command.summary}`, width),
    '',
    'Examples',
    ...command.examples.map((example) => `  ${example}`),
    '',
    'Usage',
    ...wrapText(usageOf(command), width - 4).map((line, i) => (i === 0 ? `  ${line}` : `    ${line}`)),
    '',
    ...command.details.flatMap((detail) => wrapText(detail, width)),
    '',
    ...(command.options.length === 0 ? [] : ['Options', ...optionLines(command.options), '']),
    'Options everywhere',
    ...optionLines(everywhere),
    '',
  ].join('\n');
}

function optionLines(options: readonly OptionRow[]): string[] {
  return twoColumns(options.map(({ name, value, help }) => [value === null ? `--${name}` : `--${name} ${value}`, help] as const));
}

/** Rows of a word and its meaning: the meanings line up. */
function twoColumns(rows: readonly (readonly [string, string])[]): string[] {
  const left = Math.max(...rows.map(([word]) => word.length)) + 4;
  return rows.flatMap(([word, meaning]) => {
    const lines = wrapText(meaning, width - left);
    return lines.map((line, i) => (i === 0 ? `  ${word}`.padEnd(left) : ' '.repeat(left)) + line);
  });
}
