import type { Problem } from '../calc/problem.js';
import type { DrawnPictures, PictureProblem } from '../picture/picture-problem.js';
import type { Budget, BudgetProblem } from '../search/budget.js';
import type { CarryProblem, StudyCarry } from '../search/carry-study.js';
import type { SearchProblem } from '../search/problem-to-solve.js';
import type { Rules } from '../study/must-keep.js';
import type { ClassReadings } from '../study/readings-report.js';
import type { SessionRecord } from '../study/record.js';
import type { ScannerFile } from '../study/scanner-file.js';
import type { SiteRules } from '../study/site-rules.js';
import type { MustKeep, Study } from '../study/study.js';
import type { Draft } from './draft.js';
import type { HeaderAnswer, HeaderEffect } from './header-view.js';
import type { ShelfAnswer, ShelfEffect } from './shelf-messages.js';
import type { WaysAnswer } from './ways.js';

/** One key, as the terminal gives it: a name, and the text of what was typed or pasted. */
export interface KeyPress {
  readonly name: string;
  readonly text?: string;
}

/** A preset that can be chosen. */
export interface PresetChoice {
  readonly study: Study;
  readonly hash: string;
  readonly origin: 'site' | 'own' | 'shipped' | 'file';
}

/** A session that was left unfinished, as the start screen offers it. */
export interface DraftChoice {
  readonly id: string;
  readonly session: unknown;
  readonly ageMs: number;
}

/** What an effect answers. */
export type Answer =
  | { readonly kind: 'done'; readonly words: string }
  | { readonly kind: 'failed'; readonly problems: readonly Problem[] }
  | { readonly kind: 'value'; readonly value: number }
  | { readonly kind: 'rules'; readonly rules: Rules }
  | { readonly kind: 'draft'; readonly session: unknown }
  | { readonly kind: 'ways'; readonly ways: WaysAnswer }
  | { readonly kind: 'plan'; readonly plan: Budget }
  | { readonly kind: 'pictures'; readonly pictures: DrawnPictures }
  | { readonly kind: 'carried'; readonly carried: StudyCarry }
  | { readonly kind: 'residuals'; readonly classes: readonly ClassReadings[] }
  | ShelfAnswer
  | HeaderAnswer;

/** Everything that can happen to the interface. */
export type Message =
  | { readonly kind: 'key'; readonly key: KeyPress; readonly atMs: number }
  | { readonly kind: 'size'; readonly columns: number; readonly rows: number }
  | { readonly kind: 'tick'; readonly atMs: number }
  | { readonly kind: 'presets'; readonly presets: readonly PresetChoice[]; readonly notes: readonly string[] }
  | { readonly kind: 'drafts'; readonly drafts: readonly DraftChoice[] }
  | { readonly kind: 'scanners'; readonly scanners: readonly ScannerFile[]; readonly notes: readonly string[] }
  | { readonly kind: 'site-rules'; readonly siteRules: SiteRules }
  /** Something outside that a person should know. */
  | { readonly kind: 'note'; readonly words: string }
  /** How far a search or a reading of records is, 0 to 1. */
  | { readonly kind: 'progress'; readonly ask: number; readonly share: number }
  /** How many files a reading of headers went through. */
  | { readonly kind: 'counted'; readonly ask: number; readonly files: number }
  | { readonly kind: 'answer'; readonly ask: number; readonly answer: Answer };

/** What the interface asks of the world outside. Asks carry a number; only the answer to the newest of its kind counts. */
export type Effect =
  | { readonly kind: 'save-record'; readonly ask: number; readonly record: Omit<SessionRecord, 'id' | 'day'>; readonly again: boolean }
  | { readonly kind: 'save-draft'; readonly draft: Draft }
  | { readonly kind: 'drop-draft' }
  | { readonly kind: 'claim-draft'; readonly ask: number; readonly id: string }
  | { readonly kind: 'read-expression'; readonly ask: number; readonly text: string; readonly own: OwnName }
  | { readonly kind: 'read-rules'; readonly ask: number; readonly mustKeeps: readonly MustKeep[] }
  | { readonly kind: 'save-preset'; readonly ask: number; readonly study: Study }
  | { readonly kind: 'save-page'; readonly ask: number; readonly record: Omit<SessionRecord, 'id' | 'day'> }
  | { readonly kind: 'search'; readonly ask: number; readonly problem: SearchProblem }
  | { readonly kind: 'plan'; readonly ask: number; readonly problem: BudgetProblem }
  | { readonly kind: 'picture'; readonly ask: number; readonly problem: PictureProblem }
  | { readonly kind: 'carry'; readonly ask: number; readonly problem: CarryProblem }
  /** How far predictions have been off on a scanner, by the records. */
  | { readonly kind: 'read-residuals'; readonly ask: number; readonly scanner: string }
  /** Ends the search or plan that runs; a search answers with what it has. */
  | { readonly kind: 'stop-search' }
  | ShelfEffect
  | HeaderEffect
  | { readonly kind: 'quit' };

/** The name, unit and present value that an expression may use. */
export interface OwnName {
  readonly name: string;
  readonly unit: string;
  readonly value: number | null;
}
