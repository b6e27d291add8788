/** Parts that all our schemas are built of. */
export type Schema = { readonly [key: string]: unknown };

export const text = (longest: number, description: string): Schema => ({ type: 'string', maxLength: longest, description });
export const named = (longest: number, description: string): Schema => ({ type: 'string', minLength: 1, maxLength: longest, description });

/** An object that holds these keys and no others. */
export const closed = (properties: Schema, required: readonly string[], more: Schema = {}): Schema => ({
  type: 'object',
  additionalProperties: false,
  properties,
  ...(required.length > 0 ? { required } : {}),
  ...more,
});
