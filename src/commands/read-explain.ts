import { type ParameterKey, parameterKeys, parameterRow } from '../calc/parameters.js';
import { keywordWithTag } from '../headers/attribute-table.js';
import type { ValueRule } from '../headers/value-rule.js';
import { valueRules } from '../headers/value-rules.js';
import { wrapText } from '../session/wrap-text.js';
import type { Page } from './page.js';

function rowLines(key: ParameterKey, { from, fields, how }: ValueRule, page: Page): string[] {
  const row = parameterRow(key);
  const unit = row.kind === 'number' && row.unit !== '' ? `, ${row.unit}` : '';
  const attributes = from.length === 0 ? [] : [`DICOM: ${from.map(keywordWithTag).join(', ')}`];
  const sidecar = fields.length === 0 ? [] : [`sidecar: ${fields.join(', ')}`];
  const parts = [...attributes, ...sidecar, how];
  const head = `${key} (${row.label}${unit})`;
  if (page.reader) return [`${head}: ${parts.join('; ')}.`];
  return [
    page.emphasis('heading', head),
    ...parts.flatMap((part) => wrapText(part, page.width - 4).map((line, i) => (i === 0 ? `  ${line}` : `    ${line}`))),
  ];
}

/** The mapping table as plain text: for each parameter where it is read from, and what is done with it. */
export function explainPage(page: Page): string {
  const start =
    'Where each parameter is read from: attributes of DICOM objects by keyword, fields of BIDS sidecars (times there in seconds). Nothing else is taken out of a file, beside what groups, places and classifies images.';
  return [...wrapText(start, page.width), '', ...parameterKeys.flatMap((key) => rowLines(key, valueRules[key], page)), ''].join('\n');
}

/** The mapping table as `read --explain --json` prints it. */
export function explainJson(): string {
  const rows = parameterKeys.map((key) => {
    const { from, fields, how } = valueRules[key];
    return { parameter: key, attributes: from.map(keywordWithTag), sidecar: fields, how };
  });
  return `${JSON.stringify({ mapping: rows }, null, 2)}\n`;
}
