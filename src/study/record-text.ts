import { cleanText } from './clean-text.js';

/** Free text in a record is no longer than this, in characters. */
const maximumFreeTextLength = 80;

/** Stands beside every field of free text. */
export const freeTextReminder = 'No name, number, birth date or time of a patient. 80 characters.';

/**
 * Free text fit for one line of a record and for any terminal: cleaned, composed (Unicode NFC), 80 characters at most
 * with `...` where it was cut, unless another length is given.
 *
 * @example freeText(' in\u001b[31m  pain\n') //=> 'in[31m  pain'
 */
export function freeText(text: string, longest: number = maximumFreeTextLength): string {
  return cleanText(cleanText(text).normalize('NFC'), longest);
}

/** Initials of the operator: four characters at most. */
export function initialsText(text: string): string {
  return [...freeText(text)].slice(0, 4).join('').trim();
}

const longNumber = /\d{5,}/u;
const dateLike = /\b\d{1,4}[./-]\d{1,2}[./-]\d{1,4}\b/u;

/**
 * What in a free text could point to a patient, as a sentence for the person typing; null when nothing stands out.
 * A guess from digits alone: it cannot see a name.
 *
 * @example identifierHint('born 1.2.1950') //=> 'This looks like a date. Leave out whatever points to a patient.'
 */
export function identifierHint(text: string): string | null {
  if (dateLike.test(text)) return 'This looks like a date. Leave out whatever points to a patient.';
  if (longNumber.test(text)) return 'This looks like a number of a person or an exam. Leave out whatever points to a patient.';
  return null;
}
