/** Preloaded into a measured program: at SIGUSR2 it collects garbage and writes the size of the heap to the file HEAP_FILE names. */
import { writeFileSync } from 'node:fs';

process.on('SIGUSR2', () => {
  globalThis.gc();
  globalThis.gc();
  writeFileSync(process.env.HEAP_FILE, `${process.memoryUsage().heapUsed}\n`);
});
