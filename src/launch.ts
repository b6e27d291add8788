/**
 * What `holdfast` starts: the program beside it, with the code that V8 compiled of it when it was built. That halves the start.
 * Another Node, other options, or no such file: V8 then compiles the program as it compiles any other.
 */
import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { fileURLToPath } from 'node:url';
import { Script } from 'node:vm';

/** Name of the program's file without its ending, put in by the build; it changes with every byte of the program, since V8 does not look. */
declare const __programName: string;

const url = new URL(`./${__programName}.cjs`, import.meta.url);

function compiled(): Buffer | undefined {
  try {
    return readFileSync(fileURLToPath(new URL(`./${__programName}.cache`, import.meta.url)));
  } catch {
    return undefined;
  }
}

const cachedData = compiled();
// The bundle is ASCII: read as such, it need not be decoded.
const source = readFileSync(fileURLToPath(url), 'latin1');
const script = new Script(source, cachedData === undefined ? { filename: url.href } : { filename: url.href, cachedData });
const program = script.runInThisContext() as (require: NodeJS.Require, programUrl: string) => void;
program(createRequire(import.meta.url), url.href);
