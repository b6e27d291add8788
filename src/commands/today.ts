import type { CommandIo } from './command-io.js';

/** Today as YYYY-MM-DD, by the clock and the zone of this machine. */
export function todayOf(io: CommandIo): string {
  if (io.today !== undefined) return io.today();
  const now = new Date();
  return [now.getFullYear(), now.getMonth() + 1, now.getDate()].map((part) => String(part).padStart(2, '0')).join('-');
}
