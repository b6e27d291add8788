import { PassThrough } from 'node:stream';
import { describe, expect, it } from 'vitest';
import { holdOutput } from '../../src/terminal/held-output.js';

function held() {
  const stream = new PassThrough();
  const text = () => (stream.read() as Buffer | null)?.toString() ?? '';
  return { stream, text, output: holdOutput(stream as unknown as NodeJS.WriteStream) };
}

describe('holding an output stream', () => {
  it('keeps what others write until it lets go', () => {
    const { stream, text, output } = held();
    output.hold();
    stream.write('stray ');
    stream.write(Buffer.from('print'));
    output.write('ours');
    expect(text()).toBe('ours');
    output.release();
    expect(text()).toBe('stray print');
    stream.write('free');
    expect(text()).toBe('free');
  });

  it('tells the others that they have written', async () => {
    const { stream, output } = held();
    output.hold();
    await new Promise<void>((resolve) => stream.write('a', () => resolve()));
    await new Promise<void>((resolve) => stream.write('a', 'utf8', () => resolve()));
    expect(stream.readableLength).toBe(0);
  });

  it('can drop what it kept', () => {
    const { stream, text, output } = held();
    output.hold();
    stream.write('nobody reads this');
    output.release('drop');
    expect(text()).toBe('');
    output.hold();
    output.release();
    expect(text()).toBe('');
  });

  it('keeps no more than a bounded amount', () => {
    const { stream, text, output } = held();
    output.hold();
    for (let count = 0; count < 1000; count++) stream.write('x'.repeat(1000));
    output.release();
    expect(text().length).toBeLessThan(70_000);
  });
});
