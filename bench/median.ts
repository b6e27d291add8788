export function median(values: readonly number[]): number {
  return percentile(values, 0.5);
}

/** Value below which a share of the values lies, straight between neighbours; the share in [0, 1]. */
export function percentile(values: readonly number[], share: number): number {
  const sorted = [...values].sort((a, b) => a - b);
  const place = share * (sorted.length - 1);
  const low = sorted[Math.floor(place)] as number;
  const high = sorted[Math.ceil(place)] as number;
  return low + (high - low) * (place - Math.floor(place));
}
