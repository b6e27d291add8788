/** Shades of meaning in plain text; each also has its own words, so that nothing is lost without colour. */
export type Emphasis = 'heading' | 'fits' | 'close' | 'over' | 'quiet';

/** How lines of text are laid out: for eyes or for a screen reader. */
export interface TextPage {
  readonly reader: boolean;
  /** Characters of a line; a screen reader breaks lines itself. */
  readonly width: number;
  readonly emphasis: (kind: Emphasis, text: string) => string;
}
