import type { ParameterKey } from '../calc/parameters.js';
import type { SlotPulses } from '../calc/pulses.js';
import type { Parameters } from '../calc/series.js';
import type { SearchSetting } from './setting.js';

const timedKeys: readonly ParameterKey[] = [
  'repetitionTimeMs',
  'echoTrainLength',
  'volumes',
  'slabs',
  'referenceScanS',
  'roundsPerHold',
  'linesPerBeat',
  'fatSuppression',
  'fatSuppressionEveryLines',
  'rfPulseStretch',
];
/** Pulses take time of their own only where the distance of fat-suppression blocks is stated. */
const blockKeys: readonly ParameterKey[] = ['fatSuppression', 'fatSuppressionEveryLines', 'rfPulseStretch'];
/** What the estimates of the shortest timing follow besides the pulses. */
const minimumKeys: readonly ParameterKey[] = [
  'echoTimeMs',
  'secondEchoTimeMs',
  'inversionTimeMs',
  'echoTrainLength',
  'echoSpacingMs',
  'flowCompensation',
  'slabSelective',
  'pixelBandwidthHz',
  'matrixRead',
];

/** A value as part of a name: objects by what they hold. */
function nameOf(value: unknown): string {
  return typeof value === 'object' ? JSON.stringify(value) : String(value as number | string | boolean | undefined);
}

/** Values of some parameters as one word. */
function wordOf(keys: readonly ParameterKey[], p: Parameters): string {
  let word = '';
  for (const key of keys) word += `${nameOf(p[key])}|`;
  return word;
}

/** Gives small numbers to what time and shortest timing follow. */
export class SignalWords {
  /** Of the parameters that time and shortest timing follow, those that a variable or carried timing can move; dummies apart. */
  readonly #timed: readonly ParameterKey[];
  readonly #minimal: readonly ParameterKey[];
  readonly #ids = new Map<string, number>();
  readonly #timeIds = new Map<number, number>();
  readonly #numberIds = new Map<number, number>();

  constructor({ problem, variables }: SearchSetting) {
    const moved: readonly ParameterKey[] = [
      ...variables.map(({ key }) => key),
      'repetitionTimeMs',
      'echoTimeMs',
      'echoSpacingMs',
      'echoTrainLength',
    ];
    const blocks =
      problem.series.parameters.fatSuppressionEveryLines !== undefined || variables.some(({ key }) => key === 'fatSuppressionEveryLines');
    this.#timed = timedKeys.filter((key) => moved.includes(key) && (blocks || !blockKeys.includes(key)));
    this.#minimal = minimumKeys.filter((key) => moved.includes(key));
  }

  /** True for a parameter that the time of the lines follows, dummies apart. */
  times(key: ParameterKey): boolean {
    return this.#timed.includes(key);
  }

  /** For the time of the lines, dummies apart. */
  shotId(p: Parameters, rounds: number): number {
    return this.#idFor(`time ${wordOf(this.#timed, p)}${rounds}`);
  }

  /** For what of that time follows all parameters but these. */
  shotIdWithout(keys: readonly ParameterKey[], p: Parameters): number {
    return this.#idFor(
      `time ${wordOf(
        this.#timed.filter((key) => !keys.includes(key)),
        p,
      )}`,
    );
  }

  /** For a number: equal numbers have the same. */
  numberId(value: number): number {
    let id = this.#numberIds.get(value);
    if (id === undefined) {
      id = this.#numberIds.size;
      this.#numberIds.set(value, id);
    }
    return id;
  }

  timeId(shotId: number, dummyShots: number): number {
    const key = shotId * 4096 + dummyShots;
    let id = this.#timeIds.get(key);
    if (id === undefined) {
      id = this.#timeIds.size;
      this.#timeIds.set(key, id);
    }
    return id;
  }

  minimumId(p: Parameters, { excitation, refocusing }: SlotPulses): number {
    return this.#idFor(`minimum ${wordOf(this.#minimal, p)}${excitation.durationMs}|${refocusing?.durationMs}`);
  }

  #idFor(word: string): number {
    let id = this.#ids.get(word);
    if (id === undefined) {
      id = this.#ids.size;
      this.#ids.set(word, id);
    }
    return id;
  }
}
