/** A memory of answers that never grows beyond twice its size. */
export interface BoundedCache<Value> {
  readonly get: (key: string) => Value | undefined;
  readonly set: (key: string, value: Value) => void;
}

/**
 * Remembers the latest answers. When `size` new ones are in, the older half is forgotten, except what was asked for since.
 *
 * @param size At least 1.
 */
export function boundedCache<Value>(size: number): BoundedCache<Value> {
  let recent = new Map<string, Value>();
  let older = new Map<string, Value>();
  const set = (key: string, value: Value) => {
    if (recent.size >= size) {
      older = recent;
      recent = new Map();
    }
    recent.set(key, value);
  };
  return {
    get: (key) => {
      const value = recent.get(key);
      if (value !== undefined) return value;
      const old = older.get(key);
      if (old !== undefined) set(key, old);
      return old;
    },
    set,
  };
}
