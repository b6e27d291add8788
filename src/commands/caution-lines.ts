import type { Caution } from '../calc/caution.js';
import type { Emphasis } from '../session/text-page.js';
import { wrapText } from '../session/wrap-text.js';
import { cleanText } from '../study/clean-text.js';
import type { Page } from './page.js';

const kindOf: Readonly<Record<Caution['level'], Emphasis>> = { error: 'over', caution: 'close', note: 'quiet' };

/** Cautions as lines, worst first as they come: the level in words, the text, its code. */
export function cautionLines(cautions: readonly Caution[], page: Page): string[] {
  return cautions.flatMap(({ level, text, code }) => {
    const lines = wrapText(cleanText(`${level}: ${text} [${code}]`), page.width - 4);
    return lines.map((line, i) => `  ${i === 0 ? page.emphasis(kindOf[level], line) : `  ${line}`}`);
  });
}
