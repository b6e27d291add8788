import type { FigureKey } from '../calc/figures.js';
import { usualTargetSnr } from '../picture/picture-pair.js';
import { pictureSet } from './picture-view.js';
import { pictureFigureWords } from './picture-words.js';
import { resultOnOwnField, resultWith, studySeries } from './results.js';
import { sayFigure } from './say-figure.js';
import type { State } from './state.js';

/** What is seen when a figure grows, and when it falls; of ratios against the preset. */
const seen: readonly (readonly [FigureKey, string, string])[] = [
  ['relativeSnr', 'the grain is finer', 'the grain is coarser'],
  [
    'relativeContrast',
    'target and comparison stand further apart in the grain',
    'target and comparison stand closer together in the grain',
  ],
  ['voxelReadMm', 'fine lines across readout run together', 'finer lines across readout are told apart'],
  ['voxelPhaseMm', 'fine lines across phase run together', 'finer lines across phase are told apart'],
  ['voxelSliceMm', 'small discs fade and leaning edges widen', 'small discs stand out and leaning edges sharpen'],
  ['blurFwhmPx', 'edges along phase are softer', 'edges along phase are sharper'],
  ['chemicalShiftMm', 'fat lies further from its place', 'fat lies nearer to its place'],
];

/** The pictures in sentences, one for each difference: for screen readers, and wherever no picture can be drawn. */
export function pictureSentences(state: State): string[] {
  const { seriesId } = state.place;
  const { set, of } = pictureSet(state);
  const series = studySeries(state, seriesId);
  const now = resultWith(state, seriesId, set);
  const before = resultOnOwnField(state, seriesId).evaluation.figures;
  const { figures } = now.evaluation;
  const differences = seen.flatMap(([key, more, less]) => {
    const [was, is] = [key.startsWith('relative') ? 1 : before[key], figures[key]];
    if (was === null || is === null || sayFigure(key, was) === sayFigure(key, is)) return [];
    const words = key.startsWith('relative') ? `${sayFigure(key, is)} of the preset's` : `${sayFigure(key, was)} to ${sayFigure(key, is)}`;
    return [`${is > was ? more : less} (${words})`.replace(/^./, (first) => first.toUpperCase())];
  });
  const folds = now.cautions.filter(({ code }) => code === 'wrap' || code === 'wrap-unfoldable').map(({ text }) => text);
  return [
    `Preset and ${of === 'way' ? 'this way' : 'now'}, as an illustration of the model: an invented object, never an image of a patient`,
    ...(differences.length + folds.length === 0 ? ["Nothing is seen that is not seen in the preset's picture"] : differences),
    ...folds,
    ...pictureFigureWords(series, before, figures),
    `Assumed: the target has a signal to noise of ${usualTargetSnr} in the preset`,
    ...(state.picture?.seriesId === seriesId ? (state.picture.drawn?.pair.notes ?? []) : []),
    ...(state.picture?.trouble == null ? [] : [state.picture.trouble]),
  ];
}
