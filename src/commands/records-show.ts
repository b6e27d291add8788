import { recordPage } from '../study/record-print.js';
import type { CommandIo } from './command-io.js';
import type { CommandRequest } from './command-request.js';
import { commandSettings } from './command-settings.js';
import { complain } from './complain.js';
import { type ExitCode, exitCodes } from './exit-codes.js';
import { findRecord } from './find-record.js';
import { pageOf } from './page.js';

/** `holdfast records show`: one session as its page of paper, or as JSON. */
export async function runRecordsShow(request: CommandRequest, io: CommandIo): Promise<ExitCode> {
  const settings = await commandSettings(request, io);
  if (!settings.ok) return complain(settings, io);
  const [wanted = '', ...named] = request.arguments;
  const found = await findRecord(wanted, named, settings.value, request.has('reader'), io);
  if (!found.ok) return complain(found, io);
  io.write(request.has('json') ? `${JSON.stringify(found.value, null, 2)}\n` : pageOf(request, io).plain(recordPage(found.value)));
  return exitCodes.done;
}
