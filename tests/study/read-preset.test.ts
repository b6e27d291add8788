import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { loadParser } from '../../src/formulas/load-parser.js';
import { readPreset } from '../../src/study/read-preset.js';

const parse = await loadParser();

/** A small preset of our own, one key a line, so that the lines in the messages below can be counted. */
const good = `{
  "format": "holdfast preset",
  "version": 1,
  "id": "liver-test",
  "title": "Liver, test",
  "region": "liver",
  "fieldT": 3,
  "minimumSet": ["t1-3d", ["dwi", "t1-3d"]],
  "series": [
    {
      "id": "t1-3d",
      "title": "3D T1, dynamic",
      "family": "spoiled-gradient-echo",
      "acquisition": "3D",
      "target": "liver",
      "comparison": "spleen",
      "parameters": {
        "repetitionTimeMs": 3.55,
        "echoTimeMs": 1.2,
        "flipAngleDeg": 10,
        "fieldOfViewMm": 380,
        "matrixRead": 320,
        "matrixPhase": 200,
        "sliceCount": 72,
        "sliceThicknessMm": 3,
        "pixelBandwidthHz": 635
      },
      "ranges": { "averages": [1, 2] },
      "mustKeep": [{ "figure": "voxelSliceMm", "atMost": 5, "source": "a source" }]
    },
    {
      "id": "dwi",
      "title": "Diffusion",
      "family": "echo-planar-spin-echo",
      "acquisition": "2D",
      "target": "liver",
      "comparison": "spleen",
      "parameters": {
        "repetitionTimeMs": 4800,
        "echoTimeMs": 62,
        "fieldOfViewMm": 380,
        "matrixRead": 128,
        "matrixPhase": 128,
        "sliceCount": 30,
        "sliceThicknessMm": 6,
        "pixelBandwidthHz": 1500,
        "diffusion": { "bValuesSPerMm2": [50, 800], "directions": 3, "averages": [2, 5] }
      },
      "pairedWith": ["t1-3d"]
    }
  ]
}
`;

function changed(from: string, to: string): string {
  if (!good.includes(from)) throw new Error(`nothing to change: ${from}`);
  return good.replace(from, to);
}

function problemsOf(text: string) {
  const read = readPreset(text, 'presets/liver.json', parse);
  return read.ok ? [] : read.problems;
}

describe('readPreset', () => {
  it('reads a preset, defaults filled in', () => {
    const read = readPreset(good, 'presets/liver.json', parse);
    expect(read.ok).toBe(true);
    if (!read.ok) return;
    expect(read.value).toMatchObject({ status: 'draft', revision: 1, notes: '', minimumSet: ['t1-3d', ['dwi', 't1-3d']] });
    const [t1, dwi] = read.value.series;
    expect(t1).toMatchObject({
      plane: 'axial',
      purpose: null,
      priority: 1,
      contrastAgent: false,
      nullTissue: null,
      pairedWith: [],
      locked: [],
      opened: [],
    });
    expect(dwi).toMatchObject({ priority: 2, mustKeep: [], ranges: {}, tissueOverrides: {}, pairedWith: ['t1-3d'] });
    expect(t1?.parameters).toMatchObject({
      averages: 1,
      phaseDirection: 'AP',
      pacing: { kind: 'none' },
      slabSelective: true,
      partialFourierSlice: 1,
    });
    expect(dwi?.parameters).toMatchObject({ flipAngleDeg: 90, echoTrainLength: 128, echoSpacingMs: 0.7 });
    expect(t1?.parameters.displayMatrix).toBe(undefined);
  });

  it('takes a parameter that the class does not use', () => {
    expect(problemsOf(changed('"flipAngleDeg": 10,', '"flipAngleDeg": 10, "linesPerBeat": 8, "inversionTimeMs": 800,'))).toEqual([]);
  });

  it('takes a byte order mark and Windows line ends', () => {
    expect(problemsOf(`\uFEFF${good.replaceAll('\n', '\r\n')}`)).toEqual([]);
  });

  it('removes control and bidirectional characters from texts', () => {
    const read = readPreset(changed('"Liver, test"', '"Liver\\u001b[2J,\\u202e test\\n\\u0007"'), 'x.json', parse);
    expect(read.ok && read.value.title).toBe('Liver[2J, test');
  });
});

describe('readPreset names file, line, key, what was given and what was expected', () => {
  const file = 'presets/liver.json';
  const series = `${file}, line`;
  it.each([
    [
      'an unknown key',
      changed('"matrixRead": 320', '"matrixReed": 320'),
      [
        `${series} 17, series.t1-3d.parameters.matrixRead: the key "matrixRead" is missing; expected it to be there. | Add "matrixRead".`,
        `${series} 22, series.t1-3d.parameters.matrixReed: the key "matrixReed" is not known here; expected "matrixRead". | Did you mean "matrixRead"?`,
      ],
    ],
    [
      'an unknown key of a series',
      changed('"pairedWith"', '"pairedwith"'),
      [`${series} 49, series.dwi.pairedwith: the key "pairedwith" is not known here; expected "pairedWith". | Did you mean "pairedWith"?`],
    ],
    [
      'a parameter outside "parameters"',
      changed('"pairedWith": ["t1-3d"]', '"averages": 2'),
      [
        `${series} 49, series.dwi.averages: the key "averages" is not known here; expected one of the keys that the schema lists. | It belongs inside "parameters".`,
      ],
    ],
    [
      'an unknown key inside pacing',
      changed('"flipAngleDeg": 10,', '"flipAngleDeg": 10, "pacing": { "kind": "none", "period": 4000 },'),
      [
        `${series} 20, series.t1-3d.parameters.pacing.period: the key "period" is not known here; expected "periodMs". | Did you mean "periodMs"?`,
      ],
    ],
    [
      'a wrong type',
      changed('"matrixRead": 320', '"matrixRead": "320"'),
      [
        `${series} 22, series.t1-3d.parameters.matrixRead: "320" was given; expected a whole number from 8 to 4096. | Change the value to that kind.`,
      ],
    ],
    [
      'null',
      changed('"matrixRead": 320', '"matrixRead": null'),
      [
        `${series} 22, series.t1-3d.parameters.matrixRead: null was given; expected a whole number from 8 to 4096. | Change the value to that kind.`,
      ],
    ],
    [
      'a negative matrix',
      changed('"matrixRead": 320', '"matrixRead": -256'),
      [
        `${series} 22, series.t1-3d.parameters.matrixRead: -256 was given; expected a whole number from 8 to 4096. | Write a number within the range.`,
      ],
    ],
    [
      'a broken matrix',
      changed('"matrixRead": 320', '"matrixRead": 320.5'),
      [
        `${series} 22, series.t1-3d.parameters.matrixRead: 320.5 was given; expected a whole number from 8 to 4096. | Change the value to that kind.`,
      ],
    ],
    [
      'a partial Fourier of a half',
      changed('"flipAngleDeg": 10,', '"flipAngleDeg": 10, "partialFourierPhase": 0.5,'),
      [
        `${series} 20, series.t1-3d.parameters.partialFourierPhase: 0.5 was given; expected a number from more than 0.5 to 1. | Write a number within the range.`,
      ],
    ],
    ['NaN', changed('"matrixRead": 320', '"matrixRead": NaN'), [`${series} 22: NaN was found; expected a number. | Write a plain number.`]],
    [
      'infinity',
      changed('"matrixRead": 320', '"matrixRead": 1e999'),
      [`${series} 22: 1e999 was found; expected a number within the range of the key. | Write a plain number.`],
    ],
    [
      'a duplicate key',
      changed('"matrixRead": 320', '"matrixRead": 320,\n"matrixRead": 256'),
      [
        `${series} 23, series.t1-3d.parameters.matrixRead: the key "matrixRead" stands there twice, first on line 22; expected each key once. | Take one of them out.`,
      ],
    ],
    [
      'an unknown family',
      changed('"spoiled-gradient-echo"', '"spoilt-gradient-echo"'),
      [
        `${series} 13, series.t1-3d.family: "spoilt-gradient-echo" was given; expected one of spin-echo, fast-spin-echo, single-shot-fast-spin-echo, rotating-strip-fast-spin-echo, spoiled-gradient-echo, balanced-steady-state, inversion-prepared-gradient-echo, echo-planar-gradient-echo, echo-planar-spin-echo. | Did you mean "spoiled-gradient-echo"?`,
      ],
    ],
    [
      'a class that does not exist',
      changed('"spoiled-gradient-echo"', '"single-shot-fast-spin-echo"'),
      [`${series} 14, series.t1-3d.acquisition: "3D" was given; expected 2D in this family. | Change the acquisition, or the family.`],
    ],
    [
      'an unknown tissue',
      changed('"target": "liver"', '"target": "livr"'),
      [`${series} 15, series.t1-3d.target: "livr" was given; expected one of the 22 known names. | Did you mean "liver"?`],
    ],
    [
      'an angle that a gradient echo needs',
      changed('"flipAngleDeg": 10,\n', ''),
      [
        `${series} 17, series.t1-3d.parameters.flipAngleDeg: the key "flipAngleDeg" is missing; expected it to be there. | Add "flipAngleDeg".`,
      ],
    ],
    [
      'the TI of the inversion-prepared class',
      changed('"spoiled-gradient-echo"', '"inversion-prepared-gradient-echo"'),
      [
        `${series} 17, series.t1-3d.parameters.inversionTimeMs: the key "inversionTimeMs" is missing; expected it to be there. | Add "inversionTimeMs".`,
      ],
    ],
    [
      'no series',
      changed(good.slice(good.indexOf('"series": ['), good.lastIndexOf(']') + 1), '"series": []'),
      [`${series} 9, series: 0 items were given; expected at least 1. | Fill it in.`],
    ],
    [
      'an id that is no file name',
      changed('"liver-test"', '"../Liver"'),
      [`${series} 4, id: "../Liver" was given; expected lower-case letters, digits, "." and "-", a letter or digit first. | Rename it.`],
    ],
    [
      'another format',
      changed('"holdfast preset"', '"preset"'),
      [`${series} 2, format: "preset" was given; expected "holdfast preset". | Change it to that.`],
    ],
    ['a later version', changed('"version": 1', '"version": 2'), [`${series} 3, version: 2 was given; expected 1. | Change it to that.`]],
    [
      'a field of zero',
      changed('"fieldT": 3', '"fieldT": 0'),
      [`${series} 7, fieldT: 0 was given; expected a number from 0.05 to 12. | Write a number within the range.`],
    ],
    [
      'two series of one id',
      changed('"id": "dwi"', '"id": "t1-3d"').replace('["dwi", "t1-3d"]', '"t1-3d"'),
      [`${series} 32, series.t1-3d.id: the id "t1-3d" is used twice; expected an id for each series of its own. | Rename one of them.`],
    ],
    [
      'a minimum set that names no series',
      changed('["dwi", "t1-3d"]', '["dvi"]'),
      [`${series} 8, minimumSet.2.1: there is no series "dvi"; expected one of t1-3d, dwi. | Did you mean "dwi"?`],
    ],
    [
      'a pair that names no series',
      changed('"pairedWith": ["t1-3d"]', '"pairedWith": ["t2"]'),
      [
        `${series} 49, series.dwi.pairedWith.1: there is no series "t2"; expected one of t1-3d, dwi. | Use the id of a series of this file.`,
      ],
    ],
    [
      'a must-keep without a limit',
      changed('"atMost": 5, ', ''),
      [`${series} 29, series.t1-3d.mustKeep.1: no limit is given; expected atMost, atLeast or between. | Add a limit.`],
    ],
    [
      'a must-keep of nothing',
      changed('"figure": "voxelSliceMm", ', ''),
      [
        `${series} 29, series.t1-3d.mustKeep.1: nothing to keep is named; expected one of figure, parameter or rule. | Name one, and write a second must-keep for the other.`,
      ],
    ],
    [
      'a must-keep of two things',
      changed('"figure": "voxelSliceMm", ', '"figure": "voxelSliceMm", "parameter": "sliceGapMm", '),
      [
        `${series} 29, series.t1-3d.mustKeep.1: figure and parameter stand together; expected one of figure, parameter or rule. | Name one, and write a second must-keep for the other.`,
      ],
    ],
    [
      'limits the wrong way round',
      changed('"atMost": 5', '"between": [5, 3]'),
      [`${series} 29, series.t1-3d.mustKeep.1: the lower limit is above the upper one; expected the lower limit first. | Swap the limits.`],
    ],
    [
      'a must-keep without a source',
      changed(', "source": "a source"', ''),
      [`${series} 29, series.t1-3d.mustKeep.1.source: the key "source" is missing; expected it to be there. | Add "source".`],
    ],
    [
      'a hostile rule',
      changed('"figure": "voxelSliceMm", "atMost": 5', '"rule": "x.constructor > 1"'),
      [
        `${series} 29, series.t1-3d.mustKeep.1.rule: a property is not allowed in "x.constructor" at character 1; expected names of parameters and figures, numbers, comparisons, and, or, not, + - * / ^, parentheses, min, max, abs, sqrt, units after numbers. | Write the rule with what is allowed.`,
      ],
    ],
    [
      'a condition with an unknown name',
      changed('"atMost": 5', '"atMost": 5, "when": "avarages > 1"'),
      [
        `${series} 29, series.t1-3d.mustKeep.1.when: the name "avarages" is not known in "avarages" at character 1; expected a parameter or figure key. | Did you mean "averages"?`,
      ],
    ],
    [
      'a range beyond the table',
      changed('"averages": [1, 2]', '"averages": [0, 2]'),
      [`${series} 28, series.t1-3d.ranges.averages: 0 was given; expected numbers from 0.1 to 256. | Change the range.`],
    ],
    [
      'a range of an unknown key',
      changed('"averages": [1, 2]', '"avarages": [1, 2]'),
      [`${series} 28, series.t1-3d.ranges.avarages: the key "avarages" is not known here; expected "averages". | Did you mean "averages"?`],
    ],
    [
      'averages that are too few for the b-values',
      changed('"averages": [2, 5]', '"averages": [2]'),
      [
        `${series} 47, series.dwi.parameters.diffusion.averages: 1 averages for 2 b-values; expected 2, one for each b-value. | Give the averages of every b-value, in the same order.`,
      ],
    ],
    [
      'averages beside diffusion',
      changed('"pixelBandwidthHz": 1500,', '"pixelBandwidthHz": 1500, "averages": 2,'),
      [
        `${series} 46, series.dwi.parameters.averages: 2 beside "diffusion"; expected 1, since each b-value has its own averages. | Leave "averages" out and use "diffusion.averages".`,
      ],
    ],
    [
      'a trailing comma',
      changed('"pixelBandwidthHz": 635\n', '"pixelBandwidthHz": 635,\n'),
      [
        `${series} 27: "}" was found; expected a key in double quotes. | Mend the JSON at this line; it allows no comments and no trailing commas.`,
      ],
    ],
    [
      'a comment',
      changed('"fieldT": 3,', '"fieldT": 3, // tesla'),
      [
        `${series} 7: "/" was found; expected a key in double quotes. | Mend the JSON at this line; it allows no comments and no trailing commas.`,
      ],
    ],
    [
      'deep nesting',
      changed('"fieldT": 3', `"fieldT": ${'['.repeat(30)}${']'.repeat(30)}`),
      [
        `${series} 7: nesting of more than 20 levels was found; expected at most 20 levels. | A preset has few levels: check that this is the right file.`,
      ],
    ],
    [
      'an empty file',
      '',
      [
        `${series} 1: the end of the file was found; expected a value: a number, a text in double quotes, true, false, a list or an object. | Mend the JSON at this line; it allows no comments and no trailing commas.`,
      ],
    ],
    ['a list', '[]', [`${series} 1: [] was given; expected an object. | Change the value to that kind.`]],
    [
      'a file of 2 MB',
      `${good}${' '.repeat(2_000_000)}`,
      [
        `${file}: more than 1 MB were given; expected a preset of at most 1 MB. | A preset is one study: check that this is the right file.`,
      ],
    ],
    [
      'a file of more than 1 MB in bytes only',
      changed('"Liver, test"', `"${'\u4e2d'.repeat(350_000)}"`),
      [
        `${file}: more than 1 MB were given; expected a preset of at most 1 MB. | A preset is one study: check that this is the right file.`,
      ],
    ],
    [
      'a binary file',
      '\u0089PNG\r\n\u001a\n\u0000\u0000',
      [`${series} 2: bytes that are no text were given; expected a JSON file in UTF-8. | Check that this is the right file.`],
    ],
    [
      'a file that is no UTF-8',
      '{"title": "caf\uFFFD"}',
      [`${series} 1: bytes that are no text were given; expected a JSON file in UTF-8. | Check that this is the right file.`],
    ],
    [
      'a title of 200 characters',
      changed('Liver, test', 'x'.repeat(200)),
      [`${series} 5, title: 200 characters were given; expected at most 120. | Make it shorter.`],
    ],
  ])('%s', (_name, text, messages) => {
    expect(problemsOf(text).map(({ message, hint }) => `${message} | ${hint}`)).toEqual(messages);
  });

  it('keeps what a file says out of the terminal in its own messages', () => {
    const read = readPreset(
      changed('"matrixRead": 320', '"matrix\\u001b]0;x\\u0007\\u202eRead\\n": "\\u001b[31m"'),
      'a\u001b[2J.json',
      parse,
    );
    const all = read.ok ? '' : read.problems.map(({ message, hint, path }) => message + hint + path).join('');
    expect(all).toContain('matrix]0;xRead');
    // biome-ignore lint/suspicious/noControlCharactersInRegex: control characters are what must be gone
    expect(all).not.toMatch(/[\u0000-\u001f\u007f-\u009f\u202a-\u202e]/); // oxlint-disable-line no-control-regex
  });

  it('tells the first twenty of very many problems, and how many more', () => {
    const keys = Array.from({ length: 300 }, (_, i) => `"unknown${i}": 1,`).join('\n');
    const problems = problemsOf(changed('"fieldT": 3,', `"fieldT": 3, ${keys}`));
    expect(problems).toHaveLength(21);
    expect(problems[20]?.message).toBe('and 280 more problems.');
  });

  it('takes rules as they are without a parser', () => {
    expect(readPreset(changed('"figure": "voxelSliceMm", "atMost": 5', '"rule": "x.constructor > 1"'), 'a.json').ok).toBe(true);
  });
});

describe('readPreset never throws', () => {
  const pieces = good.split(/(?<=[,:{}[\]])|(?=[,:{}[\]])/);

  it('for texts that are nearly presets', () => {
    const scrap = fc.constantFrom(
      '{',
      '}',
      '[',
      ']',
      ',',
      ':',
      '""',
      '"id"',
      '"__proto__"',
      '"constructor"',
      '-1',
      '1e999',
      '0',
      'null',
      'true',
      'NaN',
      '"x"',
      '\n',
      '\u0000',
      '{}',
      '[]',
      '"series"',
    );
    fc.assert(
      fc.property(fc.array(fc.tuple(fc.nat(pieces.length - 1), scrap), { minLength: 1, maxLength: 4 }), (edits) => {
        const damaged = [...pieces];
        for (const [at, piece] of edits) damaged[at] = piece;
        const read = readPreset(damaged.join(''), 'fuzz.json', parse);
        if (!read.ok) {
          expect(read.problems.length).toBeGreaterThan(0);
          for (const { message, hint } of read.problems) expect([message.length > 10, hint.length > 3]).toEqual([true, true]);
        }
      }),
      { numRuns: 1500 },
    );
  });

  it('for any JSON where a value is expected', () => {
    const tree = JSON.parse(good) as Record<string, unknown>;
    const paths: string[][] = [];
    const walk = (node: unknown, path: string[]): void => {
      if (path.length > 0) paths.push(path);
      if (typeof node === 'object' && node !== null) for (const [key, value] of Object.entries(node)) walk(value, [...path, key]);
    };
    walk(tree, []);
    fc.assert(
      fc.property(fc.constantFrom(...paths), fc.jsonValue(), (path, value) => {
        const copy = JSON.parse(good) as Record<string, unknown>;
        let parent = copy;
        for (const key of path.slice(0, -1)) parent = parent[key] as Record<string, unknown>;
        parent[path.at(-1) as string] = value;
        const read = readPreset(JSON.stringify(copy), 'fuzz.json', parse);
        expect(read.ok || read.problems.length > 0).toBe(true);
      }),
      { numRuns: 1500 },
    );
  });

  it('for random text and random bytes', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'binary', maxLength: 200 }), (text) => {
        expect(readPreset(text, 'fuzz.json', parse).ok).toBe(false);
      }),
      { numRuns: 500 },
    );
  });

  it('for a file of a million brackets, quotes or digits', () => {
    for (const piece of ['[', '{"a":', '"', '1', '[1,', '\\']) {
      expect(readPreset(piece.repeat(Math.floor(999_999 / piece.length)), 'fuzz.json', parse).ok).toBe(false);
    }
  });

  it('for this test file', () => {
    expect(readPreset(readFileSync(new URL(import.meta.url), 'utf8'), 'read-preset.test.ts', parse).ok).toBe(false);
  });
});
