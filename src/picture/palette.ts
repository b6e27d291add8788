/** Grey levels of a sheet: more than anybody tells apart, and half the size of the file. */
const greys = 128;

const named = {
  paper: [24, 24, 28],
  ink: [236, 236, 236],
  quiet: [160, 160, 168],
  /** Okabe & Ito's sky blue and orange: told apart by colour-blind people (Color Universal Design, 2008). */
  preset: [86, 180, 233],
  now: [230, 159, 0],
} as const;

/** Red, green and blue of each number that a pixel may hold: greys from black to white, then the colours with a name. */
export const palette: readonly (readonly [number, number, number])[] = [
  ...Array.from({ length: greys }, (_, i): [number, number, number] => {
    const value = Math.round((255 * i) / (greys - 1));
    return [value, value, value];
  }),
  ...Object.values(named),
];

/** Numbers of the colours with a name. */
export const inks = Object.fromEntries(Object.keys(named).map((name, i) => [name, greys + i])) as Readonly<
  Record<keyof typeof named, number>
>;

/**
 * Number of the grey of a share from 0 (black) to 1 (white); beyond either end that end.
 *
 * @example greyOf(2) //=> 127
 */
export function greyOf(share: number): number {
  return Math.round(Math.min(1, Math.max(0, share)) * (greys - 1));
}
