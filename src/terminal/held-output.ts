/** More than this is not kept: somebody is printing in a loop. */
const mostHeldCharacters = 65_536;

/** A stream whose other writers are kept waiting. */
export interface HeldOutput {
  /** Writes past the hold. */
  readonly write: (text: string, done?: () => void) => void;
  /** Keeps what others write from now on, instead of letting it run over the screen. */
  readonly hold: () => void;
  /** Lets others through again, and writes what was kept, or drops it if nobody is there to read it. */
  readonly release: (drop?: 'drop') => void;
}

/**
 * Takes hold of an output stream that is the terminal, so that a warning or a stray print does not run over the screen; it is
 * shown once the screen has been left.
 */
export function holdOutput(stream: NodeJS.WriteStream): HeldOutput {
  const original = stream.write.bind(stream);
  const ownProperty = Object.getOwnPropertyDescriptor(stream, 'write');
  let held = '';
  const keep = (
    chunk: string | Uint8Array,
    encoding?: BufferEncoding | ((error?: Error | null) => void),
    done?: (error?: Error | null) => void,
  ): boolean => {
    if (held.length < mostHeldCharacters) held += typeof chunk === 'string' ? chunk : Buffer.from(chunk).toString('utf8');
    const callback = typeof encoding === 'function' ? encoding : done;
    if (callback !== undefined) process.nextTick(callback);
    return true;
  };
  return {
    write: (text, done) => {
      original(text, 'utf8', done === undefined ? undefined : () => done());
    },
    hold: () => {
      stream.write = keep as typeof stream.write;
    },
    release: (drop) => {
      if (ownProperty === undefined) Reflect.deleteProperty(stream, 'write');
      else Object.defineProperty(stream, 'write', ownProperty);
      if (held !== '' && drop === undefined) original(held, 'utf8');
      held = '';
    },
  };
}
