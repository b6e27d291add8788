import { type FigureKey, type Figures, figureKeys } from '../calc/figures.js';
import { type ParameterKey, parameterKeys, parameterRow } from '../calc/parameters.js';
import type { Parameters } from '../calc/series.js';

/**
 * Names that a formula may use, and whether each is a number or a flag: figure keys, number parameters, flag parameters,
 * and `diffusion`, which stands for its highest b-value, s/mm2.
 */
export const formulaNames: ReadonlyMap<string, 'number' | 'flag'> = new Map<string, 'number' | 'flag'>([
  ...parameterKeys.flatMap((key): [string, 'number' | 'flag'][] => {
    const { kind } = parameterRow(key);
    if (kind === 'number' || key === 'diffusion') return [[key, 'number']];
    return kind === 'flag' ? [[key, 'flag']] : [];
  }),
  ...figureKeys.map((key): [string, 'number'] => [key, 'number']),
]);

/** Value of a parameter as rules and limits see it: a number, a flag, or null when it is absent or neither. */
function parameterAsSeen(key: ParameterKey, parameters: Parameters): number | boolean | null {
  if (key === 'diffusion') return parameters.diffusion === undefined ? null : Math.max(...parameters.diffusion.bValuesSPerMm2);
  const value = parameters[key];
  return typeof value === 'number' || typeof value === 'boolean' ? value : null;
}

/** Looks names of a formula up in one series: figures first, since no name stands in both tables. */
export function namedValues(parameters: Parameters, figures: Figures): (name: string) => number | boolean | null {
  return (name) => (Object.hasOwn(figures, name) ? figures[name as FigureKey] : parameterAsSeen(name as ParameterKey, parameters));
}
