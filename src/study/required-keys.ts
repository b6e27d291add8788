import { type ClassKey, classRow } from '../calc/classes.js';
import { type ParameterKey, parameterKeys, parameterRow } from '../calc/parameters.js';

/** Parameters that a series of this class must give: those without a default, the angle of gradient echoes, the TI of the inversion-prepared class. */
export function requiredParameters(key: ClassKey): readonly ParameterKey[] {
  const row = classRow(key);
  const required: ParameterKey[] = parameterKeys.filter((name) => parameterRow(name).otherwise === 'required');
  if (row.otherwise.flipAngleDeg === 'required') required.push('flipAngleDeg');
  if (row.family === 'inversion-prepared-gradient-echo') required.push('inversionTimeMs');
  return required;
}
