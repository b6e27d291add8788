/**
 * The series in the order they are run: by priority, equals in the order of the file.
 *
 * @example runningOrder([{ id: 'a', priority: 2 }, { id: 'b', priority: 1 }]).map(({ id }) => id) //=> ['b', 'a']
 */
export function runningOrder<S extends { readonly priority: number }>(series: readonly S[]): S[] {
  return [...series].sort((a, b) => a.priority - b.priority);
}
