import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { attributeRow, keywords } from '../../src/headers/attribute-table.js';
import type { Attribute } from './dicom-object.js';

/** What stands in every attribute that could name a person, place, time or device: nothing else of the tests holds it. */
export const marks = ['ZQXMARK', '19771231', '235958', '7.7.7.77', '777.125', '077Y'] as const;

/** A marked value of each representation that can hold what is not to leave a file. */
const markOf: Readonly<Record<string, string>> = {
  AE: 'ZQXMARKAE',
  AS: '077Y',
  CS: 'ZQXMARKCS',
  DA: '19771231',
  DS: '777.125',
  DT: '19771231235958',
  IS: '777125',
  LO: 'ZQXMARK LO',
  LT: 'ZQXMARK LT',
  PN: 'ZQXMARK^PN',
  SH: 'ZQXMARK SH',
  ST: 'ZQXMARK ST',
  TM: '235958',
  UC: 'ZQXMARK UC',
  UI: '1.2.7.7.7.77.1',
  UR: 'ZQXMARK:UR',
  UT: 'ZQXMARK UT',
};

/** Every attribute of the standard by the dictionary that comes with dcmtk: tag and representation. */
function dictionary(): readonly { readonly tag: string; readonly vr: string }[] {
  const folder = readdirSync('/usr/share').find((name) => name.startsWith('libdcmtk'));
  if (folder === undefined) throw new Error('the dictionary of DCMTK is not there: install it with `apt-get install dcmtk`');
  const text = readFileSync(join('/usr/share', folder, 'dicom.dic'), 'latin1');
  return [...text.matchAll(/^\(([0-9A-Fa-f]{4}),([0-9A-Fa-f]{4})\)\t(\w\w)\t/gm)].map(([, group, element, vr]) => ({
    tag: `${group},${element}`.toLowerCase(),
    vr: vr as string,
  }));
}

/** What the reader has to see to take the object for an MR image: these keep their values. */
const kept = ['0008,0016', '0008,0060', '0020,000e'];

/**
 * Marks in every attribute of the standard that holds text, names, dates, times, UIDs or numbers in text, in those that are read too
 * where they hold words, in private attributes and in a sequence of persons.
 */
export function markedAttributes(): readonly Attribute[] {
  const numbers = new Set(
    keywords.flatMap((keyword) => {
      const { tag, kind } = attributeRow(keyword);
      return tag !== null && kind === 'numbers' ? [`${tag.slice(0, 4)},${tag.slice(4)}`] : [];
    }),
  );
  const standard = dictionary().flatMap(({ tag, vr }): Attribute[] => {
    const mark = markOf[vr];
    const group = Number.parseInt(tag.slice(0, 4), 16);
    return mark === undefined || group < 8 || group >= 0x7fe0 || kept.includes(tag) || numbers.has(tag) ? [] : [{ tag, vr, value: mark }];
  });
  const person: readonly Attribute[] = [
    { tag: '0040,1101', vr: 'SQ', value: [[{ tag: '0008,0104', vr: 'LO', value: 'ZQXMARK in a sequence' }]] },
    { tag: '0040,0275', vr: 'SQ', value: [[{ tag: '0018,0020', vr: 'CS', value: 'ZQXMARK' }]] },
  ];
  const secret: readonly Attribute[] = [
    { tag: '0019,0010', vr: 'LO', value: 'ZQXMARK CREATOR' },
    { tag: '0019,1001', vr: 'LO', value: 'ZQXMARK PRIVATE' },
    { tag: '0021,1002', vr: 'UN', value: 'ZQXMARK UNKNOWN' },
  ];
  const taken = new Set([...person, ...secret].map(({ tag }) => tag));
  return [...standard.filter(({ tag }) => !taken.has(tag)), ...person, ...secret];
}
