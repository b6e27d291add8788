import { attributeRow, type Keyword, keywords, openedSequences } from '../../src/headers/attribute-table.js';

/** One line of dcmdump: how deep it stands, its tag without brackets, and what it shows. */
interface Line {
  readonly depth: number;
  readonly tag: string;
  readonly text: string;
}

const form = /^( *)\(([0-9a-f]{4}),([0-9a-f]{4})\) (\w\w|\?\?) (.*?) *#\s*(?:\d+|u\/l),/;
const keywordByTag = new Map(keywords.map((keyword) => [attributeRow(keyword).tag, keyword] as const));
const opened: readonly string[] = Object.values(openedSequences);

function linesOf(dump: string): readonly Line[] {
  return dump.split('\n').flatMap((line) => {
    const [, indent, group, element, , text] = form.exec(line) ?? [];
    return indent === undefined ? [] : [{ depth: indent.length / 2, tag: `${group}${element}`, text: text as string }];
  });
}

function valuesOf(keyword: Keyword, text: string): readonly unknown[] | null {
  if (text.startsWith('(no value')) return null;
  const pieces = (text.startsWith('[') ? text.slice(1, -1) : text).split('\\').map((piece) => piece.trim());
  const row = attributeRow(keyword);
  if (row.kind === 'numbers') {
    const numbers = pieces.map((piece) => (piece === '' ? Number.NaN : Number(piece)));
    return numbers.every(Number.isFinite) ? numbers : null;
  }
  const listed = pieces.filter((piece) => row.words.includes(piece));
  return listed.length > 0 ? listed : null;
}

/**
 * What dcmdump shows of the attributes on the list, for the first image of an object: the data set, over it the shared groups, over
 * them those of the first frame; nothing inside sequences that are not looked into.
 */
export function dumpedValues(dump: string): Readonly<Record<string, readonly unknown[]>> {
  const found: Record<string, readonly unknown[]> = {};
  const path: string[] = [];
  let framesSeen = 0;
  for (const pass of ['root', 'shared', 'frame'] as const) {
    framesSeen = 0;
    path.length = 0;
    for (const { depth, tag, text } of linesOf(dump)) {
      path.length = depth;
      path[depth] = tag;
      const above = path.slice(0, depth).filter((one) => one !== 'fffee000');
      if (tag === 'fffee000' && depth === 1 && path[0] === openedSequences.PerFrameFunctionalGroupsSequence) framesSeen += 1;
      if (above.some((one) => !opened.includes(one))) continue;
      const place =
        path[0] === openedSequences.SharedFunctionalGroupsSequence && depth > 0
          ? 'shared'
          : path[0] === openedSequences.PerFrameFunctionalGroupsSequence && depth > 0
            ? 'frame'
            : 'root';
      if (place !== pass || (place === 'frame' && framesSeen !== 1)) continue;
      const keyword = keywordByTag.get(tag);
      const values = keyword === undefined ? null : valuesOf(keyword, text);
      if (keyword !== undefined && values !== null) found[keyword] = values;
    }
  }
  return found;
}
