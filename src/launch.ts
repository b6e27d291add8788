/**
 * What `holdfast` starts: the program beside it, with the code that V8 compiled of it when it was built. That halves the start.
 * Another Node, other options, or no such file: V8 then compiles the program as it compiles any other.
 */
import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { Script } from 'node:vm';

/** Name of the program's file without its ending, put in by the build; it changes with every byte of the program, since V8 does not look. */
declare const __programName: string;

const file = join(__dirname, `${__programName}.cjs`);

function compiled(): Buffer | undefined {
  try {
    return readFileSync(join(__dirname, `${__programName}.cache`));
  } catch {
    return undefined;
  }
}

const cachedData = compiled();
const filename = pathToFileURL(file).href;
// The bundle is ASCII: read as such, it need not be decoded.
const script = new Script(readFileSync(file, 'latin1'), cachedData === undefined ? { filename } : { filename, cachedData });
const program = script.runInThisContext() as (require: NodeJS.Require, programUrl: string) => void;
program(createRequire(file), filename);
