import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Answer, Key } from '../../../src/terminal/keys/key.js';
import { type KeyState, noKeys } from '../../../src/terminal/keys/key-state.js';
import { expireKeys, keyDeadlineMs, readKeys } from '../../../src/terminal/keys/key-stream.js';
import { keyTiming } from '../../../src/terminal/keys/key-timing.js';

const timing = keyTiming({});

interface Heard {
  readonly keys: Key[];
  readonly answers: Answer[];
  readonly state: KeyState;
}

/** Plays reads and silences one after the other: a text is a read, a number is so many ms in which nothing comes. */
function hear(...events: (string | Uint8Array | number)[]): Heard {
  let state: KeyState = noKeys;
  let nowMs = 1000;
  const keys: Key[] = [];
  const answers: Answer[] = [];
  for (const event of events) {
    if (typeof event === 'number') nowMs += event;
    const reading =
      typeof event === 'number'
        ? expireKeys(state, nowMs, timing)
        : readKeys(state, typeof event === 'string' ? Buffer.from(event) : event, nowMs, timing);
    state = reading.state;
    keys.push(...reading.keys);
    answers.push(...reading.answers);
  }
  return { keys, answers, state };
}

const names = (...events: (string | Uint8Array | number)[]) =>
  hear(...events).keys.map((key) => ('text' in key ? `${key.name}:${key.text}` : key.name));

describe('a read with several keys', () => {
  it('gives three backspaces as three keys', () => {
    expect(names('\u007f\u007f\u007f')).toEqual(['backspace', 'backspace', 'backspace']);
  });

  it('gives jjjq as four keys', () => {
    expect(names('jjjq')).toEqual(['text:j', 'text:j', 'text:j', 'text:q']);
  });

  it('gives text, arrows and Enter in order', () => {
    expect(names('1\u001b[A\u001b[B\r')).toEqual(['text:1', 'up', 'down', 'enter']);
  });
});

describe('keys', () => {
  it.each<[string, Key]>([
    ['\u001b[A', { name: 'up' }],
    ['\u001bOA', { name: 'up' }],
    ['\u001b[B', { name: 'down' }],
    ['\u001b[C', { name: 'right' }],
    ['\u001b[D', { name: 'left' }],
    ['\u001b[1;5C', { name: 'right', ctrl: true }],
    ['\u001b[1;2D', { name: 'left', shift: true }],
    ['\u001b[1;3A', { name: 'up' }],
    ['\u001b[H', { name: 'home' }],
    ['\u001bOH', { name: 'home' }],
    ['\u001b[1~', { name: 'home' }],
    ['\u001b[7~', { name: 'home' }],
    ['\u001b[F', { name: 'end' }],
    ['\u001b[4~', { name: 'end' }],
    ['\u001b[8~', { name: 'end' }],
    ['\u001b[2~', { name: 'insert' }],
    ['\u001b[3~', { name: 'delete' }],
    ['\u001b[5~', { name: 'page-up' }],
    ['\u001b[6~', { name: 'page-down' }],
    ['\u001b[6;5~', { name: 'page-down', ctrl: true }],
    ['\u001b[Z', { name: 'shift-tab' }],
    ['\u001bOM', { name: 'enter' }],
    ['\t', { name: 'tab' }],
    ['\r', { name: 'enter' }],
    ['\n', { name: 'enter' }],
    ['\u0008', { name: 'backspace' }],
    ['\u007f', { name: 'backspace' }],
    ['\u001b\u007f', { name: 'backspace' }],
    ['\u0003', { name: 'control', text: 'c' }],
    ['\u001a', { name: 'control', text: 'z' }],
    ['\u001c', { name: 'control', text: '\\' }],
    ['\u0000', { name: 'control', text: ' ' }],
    ['-', { name: 'text', text: '-' }],
    ['\u00b5', { name: 'text', text: '\u00b5' }],
    ['\u6f22', { name: 'text', text: '\u6f22' }],
    ['\u{1f600}', { name: 'text', text: '\u{1f600}' }],
    ['\u001b[27u', { name: 'escape' }],
    ['\u001b[99;5u', { name: 'control', text: 'c' }],
    ['\u001b[97u', { name: 'text', text: 'a' }],
    ['\u001b[9;2u', { name: 'shift-tab' }],
    ['\u001b[27;5;99~', { name: 'control', text: 'c' }],
  ])('reads %j', (bytes, key) => {
    expect(hear(bytes).keys).toEqual([key]);
    expect(hear(bytes).state).toEqual(noKeys);
  });

  it.each([
    ['function keys', '\u001bOP\u001b[15~\u001b[[A\u001b[24;2~'],
    ['focus reports', '\u001b[I\u001b[O'],
    ['mouse reports', '\u001b[<0;12;5M\u001b[<0;12;5m\u001b[M !!'],
    ['cursor position and device reports', '\u001b[12;40R\u001b[?1;2c\u001b[?2026;2$y\u001b[8;24;80t'],
    ['colour and name reports', '\u001b]11;rgb:0000/0000/0000\u0007\u001b]4;1;red\u001b\\\u001bP>|name\u001b\\'],
    ['key releases', '\u001b[97;1:3u'],
    ['functional keys of the private area', '\u001b[57399u'],
    ['malformed UTF-8', Buffer.from([0xff, 0xc0, 0x80, 0xed, 0xa0, 0x80, 0xc2, 0x85, 0xe2, 0x82])],
  ])('gives nothing for %s', (_what, bytes) => {
    expect(hear(bytes).keys).toEqual([]);
    expect(names(bytes, 'j')).toEqual(['text:j']);
  });
});

describe('the Escape key', () => {
  it('comes after 50 ms of silence and not before', () => {
    expect(names('\u001b', 49)).toEqual([]);
    expect(names('\u001b', 50)).toEqual(['escape']);
  });

  it('waits 150 ms over SSH, or as long as it is told', () => {
    expect(keyTiming({ SSH_CONNECTION: '10.0.0.1 50000 10.0.0.2 22' }).escapeMs).toBe(150);
    expect(keyTiming({ SSH_CONNECTION: '10.0.0.1 50000 10.0.0.2 22' }, 80).escapeMs).toBe(80);
    expect(keyTiming({ SSH_CONNECTION: '' }).escapeMs).toBe(50);
  });

  it('is not seen in an arrow that comes in two reads 5 ms apart', () => {
    expect(names('\u001b', 5, '[A')).toEqual(['up']);
    expect(names('\u001b', 5, '[', 5, '1;5', 5, 'A')).toEqual(['up']);
    expect(names('\u001b[', 900, 'A')).toEqual(['up']);
  });

  it.each(['[A', 'OA', '[1;5C', '[3~', '[5~', '[200~'])('swallows the late tail %j', (tail) => {
    expect(names('\u001b', 60, tail).filter((name) => name.startsWith('text'))).toEqual([]);
    expect(names('\u001b', 60, tail)[0]).toBe('escape');
  });

  it('reads a paste whose first byte came early as a paste, not as keys', () => {
    expect(names('\u001b', 60, '[200~q\u001b[201~')).toEqual(['escape', 'paste:q']);
  });

  it('takes a tail that comes much later for typing', () => {
    expect(names('\u001b', 60, 2000, 'O', 60)).toEqual(['escape', 'text:O']);
  });

  it('keeps a bracket or an O that was typed after it', () => {
    expect(names('\u001b', 60, '[', 60)).toEqual(['escape', 'text:[']);
    expect(names('\u001b', 60, 'O', 60)).toEqual(['escape', 'text:O']);
    expect(names('\u001b', 60, 'Ok')).toEqual(['escape', 'text:O', 'text:k']);
    expect(names('\u001b', 60, '[a')).toEqual(['escape', 'text:[', 'text:a']);
  });

  it('comes twice when it was pressed twice', () => {
    expect(names('\u001b\u001b', 50)).toEqual(['escape', 'escape']);
  });

  it('comes before the key that follows in the same read', () => {
    expect(names('\u001bj')).toEqual(['escape', 'text:j']);
    expect(names('\u001bP', 50)).toEqual(['escape', 'text:P']);
    expect(names('\u001bO', 50)).toEqual(['escape', 'text:O']);
    expect(names('\u001b\u001b[A')).toEqual(['escape', 'up']);
  });
});

describe('sequences that break off', () => {
  it('are given up after a second and leave nothing behind', () => {
    expect(names('\u001b[1;', 1000, 'j')).toEqual(['text:j']);
    expect(names('\u001b]11;rgb', 1000, 'j')).toEqual(['text:j']);
    expect(names('\u001b[M!', 1000, 'j')).toEqual(['text:j']);
  });

  it('give way to Ctrl-C', () => {
    expect(names('\u001b[1;\u0003')).toEqual(['control:c']);
    expect(names('\u001b]11;\u0003')).toEqual(['control:c']);
  });

  it('give way to the sequence that follows', () => {
    expect(names('\u001b[1;\u001b[A')).toEqual(['up']);
    expect(names('\u001b]11;\u001b[A')).toEqual(['up']);
  });

  it('do not grow without end', () => {
    expect(names(`\u001b[${'1;'.repeat(1000)}`, 1000).length).toBeGreaterThan(0);
    expect(hear(`\u001b[${'1;'.repeat(1000)}`).state).toEqual(noKeys);
  });
});

describe('a paste', () => {
  it('comes whole, with one kind of line end and no control characters', () => {
    expect(hear('\u001b[200~a\r\nb\rc\u0007\u001b[Ad\u001b[201~j').keys).toEqual([
      { name: 'paste', text: 'a\nb\nc[Ad' },
      { name: 'text', text: 'j' },
    ]);
  });

  it('may be empty, and may hold what looks like the end mark', () => {
    expect(names('\u001b[200~\u001b[201~')).toEqual(['paste:']);
    expect(names('\u001b[200~[201~\u001b[201~')).toEqual(['paste:[201~']);
  });

  it('is delivered after five seconds if its end never comes, and keys work again', () => {
    expect(names('\u001b[200~abc', 4999)).toEqual([]);
    expect(names('\u001b[200~abc', 5000, 'j')).toEqual(['paste:abc', 'text:j']);
  });

  it('is cut at 64 KiB, and the rest is not read as keys', () => {
    const keys = hear(`\u001b[200~${'q'.repeat(200_000)}`, `${'x'.repeat(10)}\u001b[201~j`).keys;
    expect(keys.map((key) => key.name)).toEqual(['paste', 'text']);
    expect(keys[0]).toMatchObject({ text: 'q'.repeat(65_536) });
  });

  it('keeps all of a text that just fits', () => {
    for (const length of [65_530, 65_535, 65_536, 65_537]) {
      const [key] = hear(`\u001b[200~${'q'.repeat(length)}\u001b[201~`).keys;
      expect(key).toMatchObject({ text: 'q'.repeat(Math.min(length, 65_536)) });
    }
  });
});

describe('answers of the terminal', () => {
  it('are told apart from keys', () => {
    const heard = hear('j\u001b[0nk\u001b[3n');
    expect(heard.answers).toEqual([{ kind: 'status' }, { kind: 'status' }]);
    expect(heard.keys.map((key) => key.name)).toEqual(['text', 'text']);
  });

  it('count even when their first byte was taken for Escape', () => {
    const heard = hear('\u001b', 60, '[0n');
    expect(heard.answers).toHaveLength(1);
    expect(heard.keys).toEqual([{ name: 'escape' }]);
  });
});

describe('however the bytes are cut', () => {
  const piece = fc.oneof(
    fc.constantFrom(
      '\u001b[A',
      '\u001bOB',
      '\u001b[1;5C',
      '\u001b[3~',
      '\u001b[0n',
      '\u001b[Z',
      '\u001b[[A',
      '\u001b[M abc',
      '\u001b]0;x\u0007',
      '\u001bPq\u001b\\',
    ),
    fc.constantFrom('\u001b', '\u001b\u001b', '\u001b[', '\u001bO', '[', 'O', '\u0003', '\r', '\u007f', '\u001b[200~', '\u001b[201~'),
    fc.constantFrom('\u00b5', '\u6f22\u5b57', '\u{1f600}', 'e\u0301'),
    fc.string({ unit: 'binary', maxLength: 6 }),
    fc.string({ maxLength: 6 }).map((text) => `\u001b[200~${text}\u001b[201~`),
  );
  const bytesOf = fc.oneof(
    fc.array(piece, { maxLength: 12 }).map((pieces) => Buffer.from(pieces.join(''))),
    fc.uint8Array({ maxLength: 40 }).map((bytes) => Buffer.from(bytes)),
  );

  it('the keys and answers are the same', () => {
    fc.assert(
      fc.property(bytesOf, fc.array(fc.nat({ max: 60 }), { maxLength: 8 }), (bytes, cuts) => {
        const places = [0, ...cuts.filter((cut) => cut < bytes.length).sort((a, b) => a - b), bytes.length];
        const parts = places.slice(1).map((place, index) => bytes.subarray(places[index], place));
        expect(hear(...parts, 10_000)).toEqual(hear(bytes, 10_000));
      }),
      { numRuns: 2000 },
    );
  });

  it('a waiting state always has a deadline, and expiring it comes to rest', () => {
    fc.assert(
      fc.property(bytesOf, (bytes) => {
        const { state } = readKeys(noKeys, bytes, 0, timing);
        const deadlineMs = keyDeadlineMs(state, timing);
        expect(deadlineMs === null).toBe(state.mode === 'ground');
        const after = expireKeys(state, 10_000, timing).state;
        expect(after.mode).toBe('ground');
        expect(readKeys(after, Buffer.from('\u0003'), 30_000, timing).keys).toEqual([{ name: 'control', text: 'c' }]);
      }),
    );
  });

  it('no key carries a control character as text', () => {
    fc.assert(
      fc.property(bytesOf, (bytes) => {
        for (const key of hear(bytes, 10_000).keys) {
          if ('text' in key) expect(key.text).not.toMatch(key.name === 'paste' ? /(?![\n\t])\p{Control}/u : /\p{Control}/u);
        }
      }),
    );
  });
});
