/** `npm start`: builds what is missing or older than its sources, then runs the program with the arguments given. */
import { spawnSync } from 'node:child_process';
import { readdirSync, statSync } from 'node:fs';
import { fileURLToPath } from 'node:url';

const root = fileURLToPath(new URL('../', import.meta.url));
const bundle = `${root}dist/holdfast.js`;

/** Time of the last change below a path, in ms since 1970; 0 where there is nothing. */
function lastChange(path) {
  const found = statSync(path, { throwIfNoEntry: false });
  if (!found) return 0;
  if (!found.isDirectory()) return found.mtimeMs;
  // A folder's own time moves when a file in it appears or goes.
  return Math.max(found.mtimeMs, ...readdirSync(path).map((name) => lastChange(`${path}/${name}`)));
}

const sources = ['src', 'scripts', 'package.json', 'package-lock.json'].map((name) => lastChange(root + name));
if (lastChange(bundle) < Math.max(...sources)) {
  const built = spawnSync(process.execPath, ['--import', 'tsx', `${root}scripts/build.ts`], { cwd: root, stdio: ['ignore', 2, 2] });
  if (built.status !== 0) process.exit(built.status ?? 70);
}

const run = spawnSync(process.execPath, [bundle, ...process.argv.slice(2)], { stdio: 'inherit' });
if (run.signal) process.kill(process.pid, run.signal);
process.exitCode = run.status ?? 70;
