import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { decode } from 'fast-png';
import { describe, expect, it } from 'vitest';
import { auditRecords } from '../../scripts/invented-records.js';
import { recordLine } from '../../src/study/record-line.js';
import { temporaryFolder } from '../store/temporary-folder.js';
import { runCommand } from './run-command.js';

/** Forty invented liver sessions of the shipped preset. */
function audit() {
  const folder = temporaryFolder();
  const file = join(folder, 'records.jsonl');
  writeFileSync(
    file,
    auditRecords()
      .map((record) => `\n${recordLine(record)}\n`)
      .join(''),
  );
  return { folder, run: (...args: string[]) => runCommand([...args, '--records', file], { homeFolder: folder, workingFolder: folder }) };
}

describe('pictures of suggestions', () => {
  it('the page of the report holds one for each variant, as a PNG inside it with its caption', async () => {
    const { folder, run } = audit();
    const { exit, err } = await run('records', 'report', '--html', 'report.html');
    expect([exit, err]).toEqual([0, '']);
    const html = readFileSync(join(folder, 'report.html'), 'utf8');
    const [whole, caption, bytes] = /<img alt="([^"]+)" src="data:image\/png;base64,([A-Za-z0-9+/=]+)">/.exec(html) ?? [];
    expect(whole).toBeDefined();
    expect(html.match(/<img /g)).toHaveLength(1);
    expect(caption).toContain('liver-3t, t1-3d: ');
    expect(caption).toContain('slice thickness 3 mm to 4 mm');
    expect(caption).toContain('Never an image of a patient');
    expect(html).toContain(`<figcaption>${caption}</figcaption>`);
    expect(decode(Buffer.from(bytes as string, 'base64')).width).toBe(944);
    expect(html.replaceAll(bytes as string, '')).not.toMatch(/<script|https?:|url\(/i);
  });

  it('a change request takes one along when asked, never over a file that is there', async () => {
    const { folder, run } = audit();
    const ask = ['records', 'export', '--change-request', '--preset', 'liver-3t'];
    const plain = await run(...ask);
    expect(existsSync(join(folder, 'request.png'))).toBe(false);
    const { exit, out, err } = await run(...ask, '--picture', 'request.png');
    expect([exit, out]).toEqual([0, plain.out]);
    expect(err).toContain(`picture to go with the request: ${join(folder, 'request.png')}`);
    expect(decode(readFileSync(join(folder, 'request.png'))).text.Description).toContain('slice thickness 3 mm to 4 mm');
    expect((await run(...ask, '--picture', 'request.png')).exit).toBe(73);
    expect((await run(...ask, '--picture', 'request.pdf')).exit).toBe(64);
  });
});
