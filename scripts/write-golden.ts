/**
 * `npm run golden`: writes every figure of every shipped preset to tests/golden/figures.json, after listing what moved.
 * It refuses when a figure moved that no change of a preset explains while the version of the model stayed:
 * raise `modelVersion` in src/calc/model-version.ts first. `--first` writes all the same, before the first release.
 */
import { writeFileSync } from 'node:fs';
import { goldenFile, goldenKept, goldenNow, goldenText } from '../tests/golden/golden-figures.js';
import { movedLine, whatMoved } from '../tests/golden/what-moved.js';

const kept = goldenKept();
const now = goldenNow();
const moved = kept === null ? [] : whatMoved(kept, now);
for (const one of moved) console.log(movedLine(one));
const unexplained = moved.filter((one) => !one.presetChanged);
if (kept !== null && unexplained.length > 0 && kept.modelVersion === now.modelVersion && !process.argv.includes('--first')) {
  console.error(`${unexplained.length} values moved while the model is still version ${now.modelVersion}: nothing was written.`);
  console.error('Raise modelVersion in src/calc/model-version.ts and run this again.');
  process.exitCode = 1;
} else {
  writeFileSync(goldenFile, goldenText(now));
  console.log(`${Object.keys(now.series).length} series of model version ${now.modelVersion} written, ${moved.length} values moved.`);
}
