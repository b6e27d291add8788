import { cleanText } from './clean-text.js';
import type { Finding } from './release-checks.js';

/** One finding in one line. */
export function findingLine({ level, code, series, text }: Finding): string {
  return cleanText(`${level}: ${series === null ? '' : `${series}: `}${text} [${code}]`);
}
