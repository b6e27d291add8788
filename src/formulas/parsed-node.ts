/** What we look at in a node of mathjs: its kind and plain fields. Nothing of it is ever evaluated. */
export interface ParsedNode {
  readonly type: string;
  readonly [field: string]: unknown;
}

/** The parser, handed in because it is loaded late; throws for text that is no expression. */
export type ParseExpression = (text: string) => ParsedNode;
