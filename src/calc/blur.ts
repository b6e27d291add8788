/** Order in which a train fills the lines: from one edge to the other, or from the middle outwards. */
export type LineOrder = 'linear' | 'centric';

/** Squared magnitude of the point spread at x pixels over its value at 0, for decay a = T/T2 over a linear train. */
function linearSpread(x: number, a: number): number {
  const w = 2 * Math.PI * x;
  const decay = Math.exp(-a);
  const top = 1 - 2 * decay * Math.cos(w) + decay * decay;
  const peak = ((1 - decay) / a) ** 2;
  return top / (a * a + w * w) / peak;
}

/** The same for a centric train: decay e^(-2 a |k|), a real and even point spread. */
function centricSpread(x: number, a: number): number {
  const b = 2 * a;
  const w = 2 * Math.PI * x;
  const at = (k: number) => (Math.exp(-b * k) * (w * Math.sin(w * k) - b * Math.cos(w * k))) / (b * b + w * w);
  const value = 2 * (at(0.5) - at(0));
  const peak = (1 - Math.exp(-a)) / a;
  return (value / peak) ** 2;
}

/**
 * Full width at half maximum, in acquired pixels, of the magnitude of the point spread over a train of duration T with decay T2
 * (Constable & Gore, Magn Reson Med 1992;28:9). Without decay 1.207; for long trains (sqrt 3 / pi) T/T2 linear, (2 / pi) T/T2 centric.
 *
 * @example blurFwhmPx(1, 'linear') //=> 1.254
 */
export function blurFwhmPx(trainOverT2: number, order: LineOrder): number {
  // The closed forms divide by a: no decay is taken as next to none.
  const a = Math.max(trainOverT2, 1e-4);
  const spread = order === 'linear' ? linearSpread : centricSpread;
  // The half maximum of magnitude is a quarter of the square; it lies before the first zero, which decay only moves outwards.
  let low = 1e-6;
  let high = 1 + a;
  for (let i = 0; i < 46; i += 1) {
    const middle = (low + high) / 2;
    if (spread(middle, a) > 0.25) low = middle;
    else high = middle;
  }
  return low + high;
}
