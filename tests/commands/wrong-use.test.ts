import { mkdirSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { inventedPreset } from '../store/invented-study.js';
import { temporaryFolder } from '../store/temporary-folder.js';
import { runCommand } from './run-command.js';

const liver = ['figures', 'liver-3t', 't1-3d'];

/** Command line, exit code, what the message must say. Nothing may stand on standard output. */
const cases: readonly [string, readonly string[], number, RegExp][] = [
  ['an unknown command', ['figurs', 'liver-3t'], 64, /no command "figurs".*Did you mean figures\?/],
  ['an unknown second word', ['presets', 'lst'], 64, /no command "presets lst".*Did you mean presets list\?/],
  ['half a command', ['presets'], 64, /"presets" alone is no command.*presets list, presets show, presets check/],
  ['the word help', ['help'], 64, /Did you mean --help\?/],
  ['an unknown option', [...liver, '--jsn'], 64, /no option --jsn in "figures".*Did you mean --json\?/],
  ['an option of another command', ['presets', 'list', '--json'], 64, /no option --json in "presets list"/],
  ['an unknown option before any command', ['--presetts', 'x'], 64, /Did you mean --presets\?/],
  ['an option without its value', [...liver, '--set'], 64, /--set needs a value/],
  ['an empty value', [...liver, '--field='], 64, /--field needs a value/],
  ['a value for a switch', [...liver, '--json=yes'], 64, /--json takes no value/],
  ['an option given twice', [...liver, '--field', '3', '--field', '1.5'], 64, /--field was given more than once/],
  ['a wrong colour', [...liver, '--color', '24'], 64, /--color takes never, 16, 256, true/],
  ['no preset', ['figures'], 64, /PRESET is missing/],
  ['one word too many', [...liver, 'extra'], 64, /"extra" is one word too many/],
  ['an unknown key', [...liver, '--set', 'matrixReed=320'], 64, /matrixReed: no such parameter.*Did you mean "matrixRead"\?/],
  ['a DICOM keyword for a key', [...liver, '--set', 'RepetitionTime=4'], 64, /Did you mean "repetitionTimeMs"\?/],
  ['a wrong unit', [...liver, '--set', 'fieldOfViewMm=38 kg'], 64, /fieldOfViewMm: "38 kg" was given.*mm, cm/],
  ['a unit of another kind', [...liver, '--set', 'repetitionTimeMs=4 mm'], 64, /repetitionTimeMs: "4 mm" was given/],
  [
    'a negative matrix',
    [...liver, '--set', 'matrixPhase=-200'],
    64,
    /matrixPhase: "-200" was given; expected a whole number from 8 to 4096/,
  ],
  ['a fraction of a slice', [...liver, '--set', 'sliceCount=12.5'], 64, /sliceCount: "12.5" was given; expected a whole number/],
  ['NaN', [...liver, '--set', 'echoTimeMs=NaN'], 64, /echoTimeMs: "NaN" was given/],
  ['infinity', [...liver, '--set', 'echoTimeMs=Infinity'], 64, /echoTimeMs: "Infinity" was given/],
  ['a number too large to hold', [...liver, '--set', 'echoTimeMs=1e999'], 64, /echoTimeMs: "1e999" was given/],
  ['a hexadecimal number', [...liver, '--set', 'sliceCount=0x10'], 64, /sliceCount: "0x10" was given/],
  ['no value', [...liver, '--set', 'averages='], 64, /expected KEY=VALUE/],
  ['no key', [...liver, '--set', '=2'], 64, /expected KEY=VALUE/],
  ['a wrong choice', [...liver, '--set', 'fatSuppression=spectrall'], 64, /Did you mean "spectral"\?/],
  [
    'a parameter of another class',
    [...liver, '--set', 'echoTrainLength=16'],
    64,
    /3D spoiled gradient echo, which has no echo train \(echoTrainLength\)/,
  ],
  [
    'a window longer than the breath',
    ['figures', 'liver-3t', 't2fs', '--set', 'pacing.windowMs=5000'],
    64,
    /window no longer than the period/,
  ],
  ['--set without SERIES', ['figures', 'liver-3t', '--set', 'averages=2'], 64, /--set needs SERIES.*ss-cor, dual-echo/],
  ['--reading without SERIES', ['figures', 'liver-3t', '--reading', 'timeS=20'], 64, /--reading needs SERIES/],
  ['a field of 0', [...liver, '--field', '0'], 64, /--field takes a field strength from 0\.05 to 12 T; "0" was given/],
  ['a negative field', [...liver, '--field', '-3'], 64, /--field takes a field strength.*"-3" was given/],
  ['a field in words', [...liver, '--field', 'high'], 64, /--field takes a field strength.*"high" was given/],
  ['a body axis that is none', [...liver, '--body', 'LR=400'], 64, /--body knows AP, RL; "LR" was given/],
  ['a negative body', [...liver, '--body', 'AP=-400'], 64, /--body AP takes more than 0/],
  ['a body axis twice', [...liver, '--body', 'AP=250,AP=260'], 64, /--body names AP twice/],
  ['a reading that is none', [...liver, '--reading', 'time=20'], 64, /--reading knows timeS, b1rmsUt, sarWkg.*Did you mean timeS\?/],
  ['a reading of 0', [...liver, '--reading', 'b1rmsUt=0'], 64, /b1rmsUt takes more than 0/],
  ['an unknown series', ['figures', 'liver-3t', 't1-3'], 66, /no series "t1-3" in preset liver-3t\. Did you mean t1-3d\?/],
  ['an unknown preset', ['figures', 'livre-3t'], 66, /no preset livre-3t.*Did you mean liver-3t\?/],
  ['a missing file', ['figures', './no-such-file.json'], 66, /no-such-file\.json is not there/],
  ['a folder for a file', ['figures', './src/'], 66, /is a folder/],
];

describe('a wrong command line', () => {
  it.each(cases)('%s', async (_name, args, exit, message) => {
    const ran = await runCommand(args);
    expect(ran.err.replace(/\n/g, ' ')).toMatch(message);
    expect(ran.err).toMatch(/^holdfast: /);
    expect(ran.out).toBe('');
    expect(ran.exit).toBe(exit);
  });

  it('control characters of the command line never come back', async () => {
    const hostile = 'li\u001b[2Jver\u0007';
    for (const args of [
      [hostile],
      ['figures', hostile],
      ['figures', 'liver-3t', hostile],
      [...liver, '--set', `${hostile}=1`],
      [...liver, `--${hostile}`],
    ]) {
      const ran = await runCommand(args);
      expect(ran.exit).toBeGreaterThan(0);
      // biome-ignore lint/suspicious/noControlCharactersInRegex: control characters are what must not be there
      expect(ran.err).not.toMatch(/[\u0000-\u0009\u000b-\u001f\u007f-\u009f]/);
    }
  });
});

describe('a wrong file', () => {
  function fileWith(content: string | Buffer): string {
    const file = join(temporaryFolder(), 'study.json');
    writeFileSync(file, content);
    return file;
  }
  const good = () => JSON.parse(inventedPreset('invented')) as { series: [{ parameters: Record<string, unknown> }] };
  function withParameter(key: string, value: unknown): string {
    const preset = good();
    preset.series[0].parameters[key] = value;
    return JSON.stringify(preset, null, 2);
  }

  const contents: readonly [string, () => string | Buffer, RegExp][] = [
    ['2 MB', () => `${' '.repeat(2_000_000)}{}`, /2000002 bytes or more, expected 1000000 at most/],
    ['binary', () => Buffer.from([0x89, 0x50, 0x4e, 0x47, 0, 1, 2, 0xff]), /bytes that are no text/],
    ['empty', () => '', /the end of the file was found/],
    ['no JSON', () => '{ "format": ', /line 1.*the end of the file was found/],
    ['an unknown key', () => withParameter('matrixReed', 3), /line \d+, series\.t2\.parameters.*matrixReed.*"matrixRead"/],
    ['a negative matrix', () => withParameter('matrixRead', -8), /line \d+, series\.t2\.parameters\.matrixRead: -8 was given/],
    ['a text for a number', () => withParameter('echoTimeMs', '5 ms'), /series\.t2\.parameters\.echoTimeMs: "5 ms" was given/],
    ['NaN', () => JSON.stringify(good()).replace('"echoTimeMs":100', '"echoTimeMs":NaN'), /NaN was found/],
    ['a duplicate key', () => JSON.stringify(good()).replace('"region"', '"title":"a","region"'), /"title" stands there twice/],
    ['nesting without end', () => '['.repeat(5000), /nesting of more than 20 levels/],
  ];

  it.each(contents)('%s: exit code 65 from figures and show, 1 from check, nothing on standard output', async (_name, content, message) => {
    const file = fileWith(content());
    for (const [command, exit] of [
      [['figures', file], 65],
      [['presets', 'show', file], 65],
      [['presets', 'check', file], 1],
    ] as const) {
      const ran = await runCommand(command);
      expect(ran.err.replace(/\n/g, ' ')).toMatch(message);
      expect([ran.exit, ran.out]).toEqual([exit, '']);
    }
  });

  it('text that steers a terminal does not reach it', async () => {
    const preset = { ...good(), title: 'a\u001b]0;owned\u0007b\u202e', notes: 'c\u009b2J' };
    const file = fileWith(JSON.stringify(preset));
    for (const command of [
      ['figures', file],
      ['presets', 'show', file],
      ['presets', 'list', '--presets', join(file, '..')],
    ]) {
      const ran = await runCommand(command);
      expect(ran.exit).toBe(0);
      // biome-ignore lint/suspicious/noControlCharactersInRegex: control characters are what must not be there
      expect(ran.out + ran.err).not.toMatch(/[\u0000-\u0009\u000b-\u001f\u007f-\u009f\u202e]/);
    }
  });

  it('a rule that reaches for more than names and numbers is refused', async () => {
    const preset = good() as unknown as { series: [Record<string, unknown>] };
    preset.series[0]['mustKeep'] = [{ rule: 'import("fs") > 1', source: 'invented' }];
    const ran = await runCommand(['figures', fileWith(JSON.stringify(preset))]);
    expect([ran.exit, ran.out]).toEqual([65, '']);
  });

  it('a rule is parsed and judged', async () => {
    const preset = good() as unknown as { series: [Record<string, unknown>] };
    preset.series[0]['mustKeep'] = [{ rule: 'sliceThicknessMm <= 4 and averages >= 1', source: 'invented' }];
    const { exit, out } = await runCommand(['figures', fileWith(JSON.stringify(preset)), '--json']);
    expect(exit).toBe(0);
    const { series } = JSON.parse(out) as { series: [{ cautions: { code: string }[] }] };
    expect(series[0].cautions.map(({ code }) => code)).toContain('must-keep');
  });

  it('check names what is right, and one wrong file does not hide it', async () => {
    const folder = temporaryFolder();
    mkdirSync(join(folder, 'site'));
    writeFileSync(join(folder, 'site', 'right.json'), inventedPreset('right'));
    writeFileSync(join(folder, 'site', 'wrong.json'), '{}');
    const ran = await runCommand(['presets', 'check', '--presets', join(folder, 'site')]);
    expect(ran.exit).toBe(1);
    expect(ran.out).toContain('right.json: right, 1 series');
    expect(ran.out).toContain('liver-3t.json: liver-3t, 5 series');
    expect(ran.err).toContain('wrong.json');
    const missing = await runCommand(['presets', 'check', join(folder, 'none.json')]);
    expect([missing.exit, missing.out]).toEqual([66, '']);
  });
});
