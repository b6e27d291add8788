/** Edges of bins of lines: every whole number while they lie more than a hundredth apart, then a hundredth apart. */
const step = 1.01;
const edges: number[] = [0, 1];

function growTo(lines: number): void {
  for (let last = edges[edges.length - 1] as number; last <= lines; last = edges[edges.length - 1] as number)
    edges.push(Math.max(last + 1, Math.ceil(last * step)));
}

/** The bin that holds a count of lines: the last edge that is not above it. */
export function binOf(lines: number): number {
  growTo(lines);
  let low = 0;
  let high = edges.length;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if ((edges[middle] as number) <= lines) low = middle;
    else high = middle;
  }
  return low;
}

/** The fewest lines of a bin. */
export function fewestOfBin(bin: number): number {
  while (bin >= edges.length) growTo(edges[edges.length - 1] as number);
  return edges[bin] as number;
}
