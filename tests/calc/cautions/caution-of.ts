import type { Caution, CautionCode } from '../../../src/calc/caution.js';
import type { Evaluation } from '../../../src/calc/evaluate.js';

/** The first caution of a code, or undefined. */
export function cautionOf(evaluation: Evaluation, code: CautionCode): Caution | undefined {
  return evaluation.cautions.find((caution) => caution.code === code);
}
