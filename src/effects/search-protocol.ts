import type { Budget, BudgetProblem } from '../search/budget.js';
import type { CarryProblem, StudyCarry } from '../search/carry-study.js';
import type { NothingFits } from '../search/nothing-fits.js';
import type { SearchProblem } from '../search/problem-to-solve.js';
import type { SearchResult } from '../search/search.js';

/** What a search gives to whoever asked: the ways, and where nothing fits what binds. */
export interface SearchAnswer {
  readonly result: SearchResult;
  readonly nothing: NothingFits | null;
}

/** What may be asked: ways of one series, a plan of the whole session, or a preset at another field. */
export type Job = SearchProblem | BudgetProblem | CarryProblem;

/** A numbered ask. `stop` is shared memory, since a busy worker reads no messages: anything but 0 ends the search with what it has. */
export interface SearchAsk {
  readonly number: number;
  readonly problem: Job;
  readonly stop: SharedArrayBuffer;
}

/** What comes back, with the number of its ask: only the newest counts. */
export type SearchReply =
  | { readonly number: number; readonly kind: 'progress'; readonly share: number }
  | { readonly number: number; readonly kind: 'answer'; readonly answer: SearchAnswer }
  | { readonly number: number; readonly kind: 'plan'; readonly plan: Budget }
  | { readonly number: number; readonly kind: 'carried'; readonly carried: StudyCarry }
  | { readonly number: number; readonly kind: 'fault'; readonly message: string };
