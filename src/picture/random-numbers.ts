/**
 * Normal random numbers of mean 0 and deviation 1 from a seed, the same on every machine: xoshiro128** (Blackman & Vigna, ACM Trans Math
 * Softw 2021;47:36) seeded by splitmix (Steele et al., OOPSLA 2014), turned by Box & Muller (Ann Math Stat 1958;29:610).
 *
 * @example normalNumbers(1)() === normalNumbers(1)() //=> true
 */
export function normalNumbers(seed: number): () => number {
  let mix = seed | 0;
  const split = () => {
    mix = (mix + 0x9e3779b9) | 0;
    let z = mix;
    z = Math.imul(z ^ (z >>> 16), 0x21f0aaad);
    z = Math.imul(z ^ (z >>> 15), 0x735a2d97);
    return z ^ (z >>> 15);
  };
  let [a, b, c, d] = [split(), split(), split(), split()];
  const next = (): number => {
    const turned = Math.imul(b, 5);
    const result = Math.imul((turned << 7) | (turned >>> 25), 9);
    const t = b << 9;
    c ^= a;
    d ^= b;
    b ^= c;
    a ^= d;
    c ^= t;
    d = (d << 11) | (d >>> 21);
    return (result >>> 0) / 4294967296;
  };
  let waiting: number | null = null;
  return () => {
    if (waiting !== null) {
      const kept = waiting;
      waiting = null;
      return kept;
    }
    const radius = Math.sqrt(-2 * Math.log(1 - next()));
    const angle = 2 * Math.PI * next();
    waiting = radius * Math.sin(angle);
    return radius * Math.cos(angle);
  };
}
