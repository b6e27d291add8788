/** A schema as the committed file holds it: two spaces, a line break at the end. */
export function schemaText(schema: unknown): string {
  return `${JSON.stringify(schema, null, 2)}\n`;
}
