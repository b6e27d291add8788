/** `npm run readme`: writes the output of every example in README.md anew. A test compares. */
import { readFileSync, writeFileSync } from 'node:fs';
import { withFreshExamples } from './readme-examples.js';

const file = new URL('../README.md', import.meta.url);
writeFileSync(file, await withFreshExamples(readFileSync(file, 'utf8')));
