/**
 * Preloaded into a measured program: when the file HEAP_ASK is there, it is removed, garbage is collected, and the size of the heap
 * is written to the file HEAP_FILE. No signal is used: what a program does with signals is its own.
 */
import { existsSync, rmSync, writeFileSync } from 'node:fs';

setInterval(() => {
  if (!existsSync(process.env.HEAP_ASK)) return;
  rmSync(process.env.HEAP_ASK);
  globalThis.gc();
  globalThis.gc();
  writeFileSync(process.env.HEAP_FILE, `${process.memoryUsage().heapUsed}\n`);
}, 100).unref();
