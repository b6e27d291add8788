/**
 * True if the screens can be drawn here: both ends are terminals, and the terminal can address its cells. Decided before anything
 * that draws is loaded.
 */
export function canDraw(
  input: { readonly isTTY?: boolean },
  output: { readonly isTTY?: boolean },
  environment: Readonly<Record<string, string | undefined>>,
): boolean {
  return input.isTTY === true && output.isTTY === true && environment.TERM !== 'dumb';
}
