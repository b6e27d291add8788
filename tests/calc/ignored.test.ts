import { describe, expect, it } from 'vitest';
import { classKeys, classRow } from '../../src/calc/classes.js';
import { ignoredIn, withoutIgnored } from '../../src/calc/ignored.js';
import { parameterKeys } from '../../src/calc/parameters.js';
import { fillDefaults, type Parameters } from '../../src/calc/series.js';
import { seriesOf } from './series-of.js';

/** What has no neutral value that would mean anything where a class has not got it. */
const never = ['refocusingAngleDeg', 'echoSpacingMs', 'flipAngleDeg', 'slabSelective'];

describe.each(classKeys)('what %s cannot use', (key) => {
  const neutral = fillDefaults(key, { echoTrainLength: 1 });
  const foreign = parameterKeys.filter((name) => !classRow(key).parameters.includes(name) && !never.includes(name));

  it('is nothing where everything else is as left out', () => {
    expect(ignoredIn(key, neutral)).toEqual([]);
  });

  it('is each parameter of another class, named one by one', () => {
    for (const name of foreign) {
      for (const value of [7, 0, 1, 2, 99, 100, 101, -1, true, 'text']) {
        const expected = value === neutral[name] ? [] : [name];
        expect(ignoredIn(key, { ...neutral, [name]: value } as Parameters), `${name} ${value}`).toEqual(expected);
      }
    }
  });

  it('is none of its own', () => {
    for (const name of classRow(key).parameters) expect(ignoredIn(key, { ...neutral, [name]: 7 } as Parameters)).toEqual([]);
  });
});

describe('a series with what its class cannot use', () => {
  it('goes on as if it had been left out', () => {
    const plain = seriesOf('spoiled-gradient-echo/2D', {});
    const given = { ...plain, parameters: { ...plain.parameters, slabs: 3, echoTrainLength: 8 } };
    const ignored = ignoredIn('spoiled-gradient-echo/2D', given.parameters);
    expect(ignored).toEqual(['slabs', 'echoTrainLength']);
    expect(withoutIgnored(given, 'spoiled-gradient-echo/2D', ignored)).toEqual(plain);
    expect(withoutIgnored(plain, 'spoiled-gradient-echo/2D', [])).toBe(plain);
  });
});
