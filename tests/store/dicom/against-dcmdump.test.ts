import { existsSync, readdirSync, readFileSync, statSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { attributeRow, keywords, openedSequences, saturationBandSequence } from '../../../src/headers/attribute-table.js';
import { parseObject } from '../../../src/store/dicom/parse-object.js';
import { takeFrames } from '../../../src/store/dicom/take-elements.js';
import { dcmdump } from '../../headers/dcmdump.js';
import { dicomObject } from '../../headers/dicom-object.js';
import { dumpedValues } from '../../headers/dumped-values.js';
import { temporaryFolder } from '../temporary-folder.js';

const folder = 'build/objects';

/** Paths of the real objects of two Debian packages (python3-pydicom, python3-nibabel); says what to do where they are not there. */
function realObjects(): readonly string[] {
  if (!existsSync(join(folder, 'complete'))) throw new Error(`${folder} is not there: run scripts/test-objects.sh (Debian, apt-get)`);
  return readdirSync(folder, { recursive: true, encoding: 'utf8' })
    .map((name) => join(folder, name))
    .filter((path) => statSync(path).isFile() && /\.dcm$|[\\/][A-Z]{2}\d+$|[\\/]\d{4,}$/.test(path));
}

const mrClasses = ['=MRImageStorage', '=EnhancedMRImageStorage'];

describe('real MR objects, attribute by attribute', () => {
  it('are read as dcmdump reads them', () => {
    let compared = 0;
    let values = 0;
    for (const path of realObjects()) {
      const dump = dcmdump(['+L', path]).out;
      if (!mrClasses.some((name) => dump.includes(`(0008,0016) UI ${name}`))) continue;
      const parsed = parseObject(readFileSync(path), true);
      if (dump.includes('# Used TransferSyntax: Big Endian')) {
        expect([path, parsed]).toEqual([path, { kind: 'trouble', trouble: 'big-endian' }]);
        continue;
      }
      expect([path, parsed.kind]).toEqual([path, 'parsed']);
      if (parsed.kind !== 'parsed') continue;
      const [first] = takeFrames(parsed.elements, parsed.bytes);
      const { SaturationBandCount: _, UnlistedScanOptions: __, ...own } = first!;
      expect({ path, values: own }).toEqual({ path, values: dumpedValues(dump) });
      compared += 1;
      values += Object.keys(own).length;
    }
    // What the two packages carry: objects explicit, implicit, compressed, padded, cut short, enhanced.
    expect(compared).toBeGreaterThan(25);
    expect(values / compared).toBeGreaterThan(15);
  });

  it('include an enhanced object with 176 frames', () => {
    const framesOf = realObjects().map((path) => {
      const parsed = parseObject(readFileSync(path), true);
      return parsed.kind === 'parsed' ? [...takeFrames(parsed.elements, parsed.bytes)] : [];
    });
    const frames = framesOf.reduce((most, each) => (each.length > most.length ? each : most));
    expect(frames.length).toBe(176);
    expect(new Set(frames.map((frame) => frame.ImagePositionPatient?.join(' '))).size).toBe(176);
  });
});

describe('the list of attributes', () => {
  it('has the tags, keywords and representations of the dictionary of DCMTK', () => {
    const rows = keywords.flatMap((keyword) => {
      const { tag, vr } = attributeRow(keyword);
      return tag === null ? [] : [{ keyword: keyword as string, tag, vr: vr as string }];
    });
    const sequences = Object.entries(openedSequences).map(([keyword, tag]) => ({ keyword, tag: tag as string, vr: 'SQ' }));
    const all = [...rows, ...sequences, { keyword: 'MRSpatialSaturationSequence', tag: saturationBandSequence, vr: 'SQ' }];
    const path = join(temporaryFolder(), 'all.dcm');
    // Implicit: the representations come from the dictionary of whoever reads.
    const attributes = all.map(({ tag }) => ({ tag: `${tag.slice(0, 4)},${tag.slice(4)}`, vr: 'CS', value: '' }));
    writeFileSync(path, dicomObject(attributes, { syntax: 'implicit' }));
    const dump = dcmdump([path]).out;
    for (const { keyword, tag, vr } of all) {
      expect(dump).toMatch(new RegExp(`\\(${tag.slice(0, 4)},${tag.slice(4)}\\) ${vr} .* ${keyword}\\n`));
    }
    expect(all.length).toBeGreaterThan(80);
  });
});
