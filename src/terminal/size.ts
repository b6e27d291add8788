/** Size of a screen in character cells. */
export interface Size {
  readonly columns: number;
  readonly rows: number;
}

/**
 * Size of a terminal, or 80 x 24 when it does not say (some serial lines report zero).
 *
 * @example sizeOf({ columns: 0, rows: 0 }) //=> { columns: 80, rows: 24 }
 */
export function sizeOf(output: { readonly columns?: number | undefined; readonly rows?: number | undefined }): Size {
  return { columns: output.columns || 80, rows: output.rows || 24 };
}
