import { type FigureKey, figureTable } from '../calc/figures.js';
import { parameterRow } from '../calc/parameters.js';
import { pageLines, pageRow as row } from './page-row.js';
import type { RecordedLimits, RecordedReading, RecordedSeries, SessionRecord } from './record.js';
import { changedFigures, changedParameters, figureWords, parameterWords } from './record-changes.js';
import { type PredictionError, predictionError } from './record-prediction.js';
import { reasonWords } from './record-reasons.js';
import { noReasonGiven, outcomeWords, qualityWords, recommendationWords } from './record-words.js';

/** What a change costs or gains; lines, shots and shortest times are left to the record itself. */
const pageFigures: readonly FigureKey[] = [
  'scanTimeS',
  'holdTimeS',
  'holds',
  'voxelReadMm',
  'voxelPhaseMm',
  'voxelSliceMm',
  'coverageMm',
  'relativeSnr',
  'relativeContrast',
  'b1PlusRmsUt',
  'rfPowerTrend',
  'sarTrendHigh',
  'temporalResolutionMs',
];
/** When all of that would need a second page. */
const shortFigures: readonly FigureKey[] = ['scanTimeS', 'holdTimeS', 'voxelSliceMm', 'relativeSnr', 'rfPowerTrend'];

/**
 * A record as one page of plain text, at most 80 columns: only what changed, planned to used, with the figures, the must-keeps
 * crossed and who accepted, reasons, readings and the recommendation. Long sessions stand closer and show fewer figures, to stay on the page.
 */
export function recordPage(record: SessionRecord): string {
  const page = linesOf(record, { figures: pageFigures, between: [''] });
  const lines = page.length <= pageLines ? page : linesOf(record, { figures: shortFigures, between: [] });
  return `${lines.join('\n')}\n`;
}

interface Layout {
  readonly figures: readonly FigureKey[];
  /** What stands between two series. */
  readonly between: readonly string[];
}

function linesOf(record: SessionRecord, { figures, between }: Layout): string[] {
  const { preset } = record;
  const asPlanned = record.series.filter(isAsPlanned).map(({ id }) => id);
  const told = record.series.filter((series) => !isAsPlanned(series));
  const someReason = record.reasons.some((reason) => reason.trim() !== '');
  return [
    ...row('Record', [record.id, record.day ?? 'day left out', `holdfast ${record.tool}`, `model ${record.model}`]),
    ...row('Preset', [`${preset.id} revision ${preset.revision} (${preset.hash.slice(0, 12)})`, record.region, `${record.fieldT} T`]),
    ...row('Where', [`scanner ${record.scanner || 'not named'}`, `coil ${record.coil ?? 'not named'}`]),
    ...row('By', [record.role || 'no role given', ...(record.initials ? [record.initials] : [])]),
    ...row('Limits', limitWords(record.limits)),
    ...row('Reasons', someReason ? record.reasons.map(reasonWords) : [told.length === 0 ? 'none needed: nothing changed' : noReasonGiven]),
    ...told.flatMap((series) => [...between, ...seriesLines(series, figures, someReason)]),
    '',
    ...(asPlanned.length === 0 ? [] : row('As planned', asPlanned)),
    ...row('Advice', [record.recommendation === null ? 'none given' : recommendationWords[record.recommendation]]),
    'Figures are computed, readings are typed. SAR and B1+rms figures are trends.',
  ];
}

/** Nothing about the series needs a word. */
function isAsPlanned(series: RecordedSeries): boolean {
  const { outcome, crossed, readings, quality } = series;
  const plain = outcome === 'done' && crossed.length === 0 && readings.before === null && readings.after === null;
  return plain && (quality === null || quality === 'diagnostic') && series.reason === '' && changedParameters(series).length === 0;
}

function seriesLines(series: RecordedSeries, figures: readonly FigureKey[], someReason: boolean): string[] {
  const { planned, used, crossed, outcome, quality, readings } = series;
  const parameters = changedParameters(series);
  // A change is covered by the reason of the whole session; a series repeated or given up needs its own.
  const covered = series.reason === '' && outcome === 'done' && (someReason || (parameters.length === 0 && crossed.length === 0));
  return [
    ...row(`* ${series.id}`, [
      outcomeWords[outcome],
      ...(quality === null ? [] : [`quality ${qualityWords[quality]}`]),
      ...(covered ? [] : [`reason: ${reasonWords(series.reason)}`]),
    ]),
    ...row(
      '  changed',
      parameters.map(
        (key) =>
          `${parameterRow(key).label} ${fromTo(parameterWords(key, planned.parameters[key]), parameterWords(key, used.parameters[key]))}`,
      ),
    ),
    ...row(
      '  figures',
      changedFigures(series)
        .filter((key) => figures.includes(key))
        .map(
          (key) =>
            `${figureTable[key].label} ${fromTo(figureWords(key, planned.figures[key] ?? null), figureWords(key, used.figures[key] ?? null))}`,
        ),
    ),
    ...row(
      '  crossed',
      crossed.map(({ rule, role }) => `${rule}: ${role === null || role === '' ? 'ACCEPTED BY NOBODY' : `accepted by ${role}`}`),
    ),
    ...row('  before', readingWords(readings.before)),
    ...row('  after', [...readingWords(readings.after), ...errorWords(predictionError(series))]),
  ];
}

/** `72 to 54`, the unit once where both have it. */
function fromTo(from: string, to: string): string {
  const unit = /[^\d.]*$/.exec(to)?.[0] ?? '';
  const bare = unit.trim() !== '' && from.endsWith(unit) ? from.slice(0, -unit.length) : from;
  return `${/^[\d.:-]+$/.test(bare) ? bare : from} to ${to}`;
}

function limitWords(limits: RecordedLimits): string[] {
  const { holdS, holdsAvailable, holdState, minutesLeft, longestSeriesS, b1rmsCapUt, sarCapWkg, frontBackMm, leftRightMm, contrastGiven } =
    limits;
  const words = [
    holdS === null ? '' : `breath-hold ${holdS} s${holdState === null ? '' : ` in ${holdState}`}`,
    holdsAvailable === null ? '' : `${holdsAvailable} holds`,
    minutesLeft === null ? '' : `${minutesLeft} min left`,
    longestSeriesS === null ? '' : `no series longer than ${longestSeriesS} s`,
    b1rmsCapUt === null ? '' : `B1+rms cap ${b1rmsCapUt} uT, read from ${limits.b1rmsReadFrom ?? 'nowhere named'}`,
    sarCapWkg === null ? '' : `SAR cap ${sarCapWkg} W/kg, read from ${limits.sarReadFrom ?? 'nowhere named'}`,
    ...limits.labelConditions.map((condition) => `label: ${condition}`),
    frontBackMm === null ? '' : `front to back ${frontBackMm} mm`,
    leftRightMm === null ? '' : `left to right ${leftRightMm} mm`,
    contrastGiven === null ? '' : `contrast ${contrastGiven ? 'given' : 'not given'}`,
  ].filter((word) => word !== '');
  return words.length === 0 ? ['none set'] : words;
}

function readingWords(reading: RecordedReading | null): string[] {
  if (reading === null) return [];
  const { timeS, b1rmsUt, sarWkg, operatingMode, changedByScanner, notModelled = [] } = reading;
  return [
    timeS === undefined ? '' : `time ${figureWords('scanTimeS', timeS)}`,
    b1rmsUt === undefined ? '' : `B1+rms ${b1rmsUt} uT`,
    sarWkg === undefined ? '' : `SAR ${sarWkg} W/kg`,
    operatingMode ? `mode ${operatingMode}` : '',
    changedByScanner ? `changed by the scanner: ${changedByScanner}` : '',
    ...notModelled.map((text) => `not modelled: ${text}`),
  ].filter((word) => word !== '');
}

function errorWords({ time, b1rms, sar }: PredictionError): string[] {
  const parts = [
    ['time', time],
    ['B1+rms', b1rms],
    ['SAR', sar],
  ] as const;
  const words = parts.flatMap(([name, error]) =>
    error === null ? [] : [`${name} ${error < 0 ? '-' : '+'}${Math.abs(error * 100).toFixed(0)} %`],
  );
  return words.length === 0 ? [] : [`against the prediction: ${words.join(', ')}`];
}
