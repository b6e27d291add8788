import { type ParameterKey, parameterKeys, parameterRow } from '../calc/parameters.js';
import { nearestWord } from './nearest-word.js';

/**
 * The parameter key that a wrong one most likely means: the nearest key, else the key whose DICOM keyword or words on screen it is.
 *
 * @example suggestParameter('RepetitionTime') //=> 'repetitionTimeMs'
 * @example suggestParameter('TR') //=> 'repetitionTimeMs'
 */
export function suggestParameter(word: string): ParameterKey | null {
  const plain = word.toLowerCase();
  const named = parameterKeys.find((key) => {
    const row = parameterRow(key);
    return row.dicom?.toLowerCase() === plain || row.label.toLowerCase() === plain;
  });
  return named ?? (nearestWord(word, parameterKeys) as ParameterKey | null);
}
