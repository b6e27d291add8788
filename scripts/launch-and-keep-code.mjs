/** Starts the program as `src/launch.ts` does, and writes what V8 has compiled of it by the time it ends: program, file to write. */
import { readFileSync, renameSync, writeFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { pathToFileURL } from 'node:url';
import { Script } from 'node:vm';

const [file, target] = process.argv.splice(2, 2);
const url = pathToFileURL(file).href;
const script = new Script(readFileSync(file, 'latin1'), { filename: url });
process.on('exit', () => {
  writeFileSync(`${target}.new`, script.createCachedData());
  renameSync(`${target}.new`, target);
});
script.runInThisContext()(createRequire(file), url);
