import type { Problem } from '../calc/problem.js';
import { cleanText } from './clean-text.js';
import type { JsonNode } from './read-json.js';

/** Keys and indices from the outermost value inwards. */
export type JsonPath = readonly (string | number)[];

/** What a message says: what was given, what was expected, what to do. */
export interface Finding {
  readonly code: string;
  readonly given: string;
  readonly expected: string;
  readonly hint: string;
}

/** A read file that can say where each of its values stands. */
export interface LocatedFile {
  /** A problem with the value (or, with `at: 'key'`, the key itself) at a path; the nearest present parent where it is missing. */
  problem(path: JsonPath, finding: Finding, at?: 'key' | 'value'): PlacedProblem;
  /** The same for a bare offset. */
  problemAt(offset: number, path: string, finding: Finding): PlacedProblem;
}

/** A problem that remembers its place in the file, for sorting. */
export interface PlacedProblem extends Problem {
  readonly offset: number;
}

/** Line of an offset, counted from 1. */
export function lineOf(text: string, offset: number): number {
  let line = 1;
  for (let at = text.indexOf('\n'); at !== -1 && at < offset; at = text.indexOf('\n', at + 1)) line += 1;
  return line;
}

/** Offset of a path in a tree: of the key or the value, or of the innermost parent that is there. Of equal keys the last one counts. */
function offsetOf(root: JsonNode, path: JsonPath, at: 'key' | 'value'): number {
  let node = root;
  let offset = root.offset;
  for (const step of path) {
    if (node.kind === 'array' && typeof step === 'number') {
      const item = node.items[step];
      if (item === undefined) return offset;
      node = item;
      offset = item.offset;
    } else if (node.kind === 'object') {
      const entry = node.entries.findLast((candidate) => candidate.key === step);
      if (entry === undefined) return offset;
      node = entry.value;
      offset = at === 'key' ? entry.keyOffset : entry.value.offset;
    } else return offset;
  }
  return offset;
}

/** Path in words: series by their id where they have one (`series.t1-3d.parameters.matrixRead`). */
function pathInWords(root: JsonNode | null, path: JsonPath): string {
  const words: string[] = [];
  let node: JsonNode | undefined = root ?? undefined;
  for (const step of path) {
    if (node?.kind === 'array') {
      node = node.items[step as number];
      const id: JsonNode | undefined = node?.kind === 'object' ? node.entries.findLast((entry) => entry.key === 'id')?.value : undefined;
      const isSeries = words.length === 1 && words[0] === 'series';
      words.push(
        isSeries && id?.kind === 'plain' && typeof id.value === 'string' && id.value !== ''
          ? cleanText(id.value, 40)
          : String((step as number) + 1),
      );
    } else {
      node = node?.kind === 'object' ? node.entries.findLast((entry) => entry.key === step)?.value : undefined;
      words.push(cleanText(String(step), 40));
    }
  }
  return words.join('.');
}

/** Joins a text, its name and its tree into something that can place problems. Lists count from 1 in words. */
export function locateIn(fileName: string, text: string, root: JsonNode | null): LocatedFile {
  const name = cleanText(fileName, 200);
  function problemAt(offset: number, path: string, { code, given, expected, hint }: Finding): PlacedProblem {
    const key = path === '' ? '' : `, ${path}`;
    return { code, path, message: `${name}, line ${lineOf(text, offset)}${key}: ${given}; expected ${expected}.`, hint, offset };
  }
  return {
    problemAt,
    problem: (path, finding, at = 'value') => problemAt(root === null ? 0 : offsetOf(root, path, at), pathInWords(root, path), finding),
  };
}
