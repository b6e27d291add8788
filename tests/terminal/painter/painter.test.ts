import { beforeEach, describe, expect, it } from 'vitest';
import { cursorHere } from '../../../src/terminal/painter/cursor-mark.js';
import { createPainter, type Painter, type PainterClock } from '../../../src/terminal/painter/painter.js';

const query = '\u001b[5n';
const begin = '\u001b[?2026h';
const end = '\u001b[?2026l';

/** A clock that stands still until it is told. */
class HeldClock implements PainterClock {
  nowMs = 0;
  #alarms: { atMs: number; run: () => void }[] = [];

  now = () => this.nowMs;

  after = (delayMs: number, run: () => void) => {
    const alarm = { atMs: this.nowMs + delayMs, run };
    this.#alarms.push(alarm);
    return () => {
      this.#alarms = this.#alarms.filter((other) => other !== alarm);
    };
  };

  pass(ms: number): void {
    const untilMs = this.nowMs + ms;
    for (;;) {
      const [next] = this.#alarms.filter((alarm) => alarm.atMs <= untilMs).sort((a, b) => a.atMs - b.atMs);
      if (next === undefined) break;
      this.#alarms = this.#alarms.filter((alarm) => alarm !== next);
      this.nowMs = Math.max(this.nowMs, next.atMs);
      next.run();
    }
    this.nowMs = untilMs;
  }
}

let clock: HeldClock;
let written: { atMs: number; text: string }[];
let waiting: (() => void)[];
let terminalIsSlow: boolean;

function painterWith(paced: boolean): Painter {
  return createPainter({
    size: { columns: 20, rows: 3 },
    paced,
    clock,
    write: (text, done) => {
      written.push({ atMs: clock.nowMs, text });
      if (terminalIsSlow) waiting.push(done);
      else done();
    },
  });
}
const last = () => written.at(-1)?.text ?? '';

beforeEach(() => {
  clock = new HeldClock();
  written = [];
  waiting = [];
  terminalIsSlow = false;
});

describe('when frames are drawn', () => {
  let painter: Painter;
  beforeEach(() => {
    painter = painterWith(false);
    painter.start();
    clock.pass(100);
    written = [];
  });

  it('a single frame goes out at once', () => {
    painter.draw('a');
    clock.pass(0);
    expect(written).toHaveLength(1);
  });

  it('frames of one moment go out as one, the last', () => {
    for (const frame of ['a', 'b', 'c']) painter.draw(frame);
    clock.pass(0);
    expect(written).toHaveLength(1);
    expect(last()).toContain('c');
  });

  it('under repeat at most 30 a second, and always the last', () => {
    for (let count = 0; count < 1000; count++) {
      painter.draw(`count ${count}`);
      clock.pass(1);
    }
    clock.pass(100);
    expect(written.length).toBeGreaterThanOrEqual(28);
    expect(written.length).toBeLessThanOrEqual(31);
    const gaps = written.slice(1).map((write, index) => write.atMs - (written[index]?.atMs ?? 0));
    expect(Math.min(...gaps)).toBeGreaterThanOrEqual(33);
    expect(last()).toContain('9');
  });

  it('a frame that changes nothing is not written', () => {
    painter.draw('a');
    clock.pass(100);
    painter.draw('a');
    clock.pass(100);
    expect(written).toHaveLength(1);
  });

  it('each is one write inside synchronised-update marks', () => {
    painter.draw('a\nb\nc');
    clock.pass(0);
    expect(written).toHaveLength(1);
    expect(last().startsWith(begin)).toBe(true);
    expect(last().endsWith(end)).toBe(true);
    expect(last()).not.toContain('\n');
  });

  it('none is written before the write before is through', () => {
    terminalIsSlow = true;
    painter.draw('a');
    clock.pass(100);
    painter.draw('b');
    painter.draw('c');
    clock.pass(1000);
    expect(written).toHaveLength(1);
    waiting.shift()?.();
    clock.pass(100);
    expect(written).toHaveLength(2);
    expect(last()).toContain('c');
  });

  it('nothing is written while paused, and everything afterwards', () => {
    painter.draw('abc');
    clock.pass(100);
    painter.pause();
    painter.draw('abd');
    clock.pass(1000);
    expect(written).toHaveLength(1);
    painter.start();
    expect(written).toHaveLength(2);
    expect(last()).toContain('\u001b[2J');
    expect(last()).toContain('abd');
  });

  it('a new size draws everything again', () => {
    painter.draw('abc\ndef');
    clock.pass(100);
    painter.resize({ columns: 2, rows: 1 });
    clock.pass(100);
    expect(last()).toContain('\u001b[2J');
    expect(last()).toContain('ab');
    expect(last()).not.toContain('abc');
    expect(last()).not.toContain('de');
  });
});

describe('starting', () => {
  it('draws the frame that is there before it returns', () => {
    const painter = painterWith(true);
    painter.draw('loading');
    expect(written).toEqual([]);
    painter.start();
    expect(last()).toContain('loading');
  });
});

describe('the cursor', () => {
  let painter: Painter;
  beforeEach(() => {
    painter = painterWith(false);
    painter.start();
    clock.pass(100);
  });
  const draw = (frame: string) => {
    painter.draw(frame);
    clock.pass(100);
    return last();
  };

  it('is shown on the marked cell, hidden while much is written, and hidden when nothing is marked', () => {
    expect(draw(`ab${cursorHere('c')}`)).toBe(`${begin}\u001b[1;1Habc\u001b[1;3H\u001b[?25h${end}`);
    expect(draw(`xb${cursorHere('c')}`)).toBe(`${begin}\u001b[1;1Hx\u001b[1;3H${end}`);
    expect(draw(`xb${cursorHere('c')}\n123456789012345678\n123456789012345678`)).toContain(`${begin}\u001b[?25l\u001b[2;1H1234`);
    draw(`xb${cursorHere('c')}`);
    expect(draw('xbc')).toBe(`${begin}\u001b[?25l${end}`);
  });

  it('moves without writing a cell', () => {
    draw(`${cursorHere('a')}b`);
    expect(draw(`a${cursorHere('b')}`)).toBe(`${begin}\u001b[1;2H${end}`);
  });
});

describe('pacing', () => {
  let painter: Painter;
  beforeEach(() => {
    painter = painterWith(true);
    painter.start();
  });
  const frames = (count: number, everyMs: number) => {
    for (let index = 0; index < count; index++) {
      painter.draw(`frame ${written.length} ${index}`);
      clock.pass(everyMs);
    }
  };

  it('asks once at the start and does not wait for the first answer', () => {
    frames(5, 40);
    expect(written.filter((write) => write.text.endsWith(query))).toHaveLength(1);
    expect(written.length).toBe(6);
    expect(painter.awaitsAnswer()).toBe(true);
  });

  it('once answered, has never more than one frame unanswered, and draws the last', () => {
    painter.answered();
    written = [];
    frames(50, 40);
    expect(written).toHaveLength(1);
    painter.answered();
    clock.pass(40);
    expect(written).toHaveLength(2);
    expect(last()).toContain('49');
    expect(last().endsWith(query)).toBe(true);
  });

  it('is off when no answer comes in time, and begins when a late one does', () => {
    clock.pass(2001);
    written = [];
    frames(5, 40);
    expect(written).toHaveLength(5);
    expect(written.some((write) => write.text.includes(query))).toBe(false);
    painter.answered();
    frames(5, 40);
    expect(written).toHaveLength(6);
  });

  it('goes on after an answer was lost', () => {
    painter.answered();
    frames(2, 40);
    const before = written.length;
    clock.pass(5000);
    expect(written.length).toBeGreaterThan(before);
    expect(last()).toContain('1');
  });

  it('takes no notice of an answer to somebody else', () => {
    painter.answered();
    painter.answered();
    written = [];
    frames(5, 40);
    expect(written).toHaveLength(1);
  });

  it('asks again after a pause', () => {
    painter.answered();
    frames(1, 40);
    painter.pause();
    expect(painter.awaitsAnswer()).toBe(true);
    painter.start();
    expect(last().endsWith(query)).toBe(true);
    painter.answered();
    expect(painter.awaitsAnswer()).toBe(false);
  });

  it('never asks when it is told not to', () => {
    const unpaced = painterWith(false);
    written = [];
    unpaced.start();
    unpaced.draw('a');
    clock.pass(100);
    expect(written.some((write) => write.text.includes(query))).toBe(false);
    expect(unpaced.awaitsAnswer()).toBe(false);
  });
});
