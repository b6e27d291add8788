import type { FigureKey } from '../calc/figures.js';
import type { GivenParameters } from '../calc/series.js';
import type { Rules } from '../study/must-keep.js';
import type { ClassReadings } from '../study/readings-report.js';
import type { ScannerFile } from '../study/scanner-file.js';
import { noSiteRules, type SiteRules } from '../study/site-rules.js';
import type { CarryView } from './carry.js';
import type { ScannerChoice } from './equipment.js';
import { emptyHeaderView, type HeaderAsk, type HeaderView } from './header-view.js';
import type { DraftChoice, KeyPress, PresetChoice } from './message.js';
import { type PictureEyes, type PictureView, plainEyes } from './picture-eyes.js';
import type { Opened, Session } from './session.js';
import { emptyShelf, type Shelf } from './shelf.js';
import type { ShelfAsk } from './shelf-messages.js';
import type { ListedWay, SessionPlan, WaysSearch } from './ways.js';

export const screenNames = [
  'start',
  'patient',
  'order',
  'series',
  'why',
  'type-these',
  'chart',
  'picture',
  'ways',
  'front',
  'keep',
  'budget',
  'readings',
  'scanner',
  'carry',
  'record',
  'presets',
  'revisions',
  'compare',
  'release',
  'records',
  'past-record',
  'report',
  'headers',
  'header-values',
  'help',
] as const;
export type ScreenName = (typeof screenNames)[number];

/** One step that can be undone: the session before it, and what was done. */
export interface Step {
  readonly session: Session;
  readonly words: string;
}

/** Which way to measure along a chart, which figures, and where the hand is. */
export interface ChartPlace {
  readonly path: string;
  readonly figures: readonly [FigureKey, FigureKey];
  readonly position: number;
}

/** Where the hands and eyes are. */
export interface Place {
  readonly screen: ScreenName;
  /** Screens that Escape goes back to, the nearest last. */
  readonly back: readonly ScreenName[];
  /** The series that is looked at. */
  readonly seriesId: string;
  /** Field under the hand, by screen: a parameter's path, a row's name. */
  readonly fields: Readonly<Partial<Record<ScreenName, string>>>;
  readonly chart: ChartPlace | null;
  /** Which pane of the series or record screen keys go to. */
  readonly pane: Pane;
  /** What was picked among the consequences, and among the cautions. */
  readonly figure: FigureKey | null;
  readonly caution: number;
  /** Line of the reasons that the hand is on. */
  readonly reason: string | null;
}

export const panes = ['main', 'consequences', 'cautions'] as const;
export type Pane = (typeof panes)[number];

/** What the records say of predictions on one scanner. */
export interface Residuals {
  readonly scanner: string;
  /** Null while they are read, and where they cannot be. */
  readonly classes: readonly ClassReadings[] | null;
}

/** What is being typed. */
export interface Entry {
  /** Where it goes: the row of the screen it was begun on. */
  readonly field: string;
  readonly text: string;
  /** An expression that is being read: its number; null while it is typed. */
  readonly ask: number | null;
  /** Everything typed goes in, also letters; false where a digit began it. */
  readonly isText: boolean;
}

/** One line that says what just happened. */
export interface Notice {
  readonly words: string;
  readonly level: 'note' | 'trouble';
}

export interface State {
  readonly presets: readonly PresetChoice[];
  /** Keys that were typed ahead of the presets, Enter the first of them; null once the presets are read. */
  readonly early: readonly KeyPress[] | null;
  readonly drafts: readonly DraftChoice[];
  /** Scanner files that can be chosen, of each name one. */
  readonly scanners: readonly ScannerFile[];
  /** What was chosen for the next session; null leaves it to the settings. */
  readonly scannerChoice: ScannerChoice | null;
  /** What the site keeps in all its presets. */
  readonly siteRules: SiteRules;
  readonly size: { readonly columns: number; readonly rows: number };
  readonly nowMs: number;
  /** Defaults of whoever works here. */
  readonly defaults: Defaults;
  /** What is wrong with files that were read at the start: it stays on the start screen. */
  readonly fileNotes: readonly string[];
  /** What narrows the list of presets. */
  readonly narrowing: string;
  readonly opened: Opened | null;
  readonly session: Session | null;
  readonly past: readonly Step[];
  readonly future: readonly Step[];
  readonly place: Place;
  readonly entry: Entry | null;
  readonly notice: Notice | null;
  readonly practiceSinceMs: number | null;
  /** Rules of must-keeps that are read already. */
  readonly rules: Rules;
  /** Asks so far; the newest of each kind that is still open. */
  readonly asks: number;
  readonly open: Readonly<
    Partial<
      Record<
        | 'record'
        | 'expression'
        | 'rules'
        | 'preset'
        | 'page'
        | 'draft'
        | 'picture'
        | 'search'
        | 'plan'
        | 'carry'
        | 'carryRules'
        | 'residuals'
        | ShelfAsk
        | HeaderAsk,
        number
      >
    >
  >;
  /** A saving of this record failed: the next try looks whether it stands there after all. */
  readonly recordFailed: boolean;
  /** The session whose record is being saved: what is changed meanwhile is not in it. */
  readonly saving: Session | null;
  readonly search: WaysSearch | null;
  /** Every way is shown, not the first ones alone. */
  readonly allWays: boolean;
  /** Lines by which what is said of a way is scrolled. */
  readonly wayScroll: number;
  /** Which front is looked at, and which of its points. */
  readonly front: { readonly which: 'timeSnr' | 'timeLoss'; readonly at: number };
  /** The way looked at last. */
  readonly lastWay: { readonly seriesId: string; readonly listed: ListedWay } | null;
  /** The way taken last: what was set before it and with it. */
  readonly taken: { readonly seriesId: string; readonly base: GivenParameters; readonly given: GivenParameters } | null;
  readonly plan: SessionPlan | null;
  /** The newest pictures of a series, and how they are looked at. */
  readonly picture: PictureView | null;
  readonly pictureEyes: PictureEyes;
  /** The preset that is carried to another field or scanner. */
  readonly carry: CarryView | null;
  /** How far predictions have been off on the scanner of the session; null until it is asked. */
  readonly residuals: Residuals | null;
  /** Presets and records, as their screens show them. */
  readonly shelf: Shelf;
  /** Headers that were read, as their screens show them. */
  readonly headers: HeaderView;
}

export interface Defaults {
  readonly role: string;
  readonly scannerName: string;
  readonly coilName: string;
  /** Preparation of a series and rest between breath-holds, as the settings have them; absent: common practice. */
  /** Scanner named on the command line. */
  readonly scanner?: ScannerChoice;
  readonly pauses?: { readonly preparationS: number; readonly restS: number };
  /** Screens are read aloud: a text is gone through line by line. */
  readonly reader?: boolean;
  /** Where presets are released to, and whether that takes a second role; absent: nowhere. */
  readonly release?: { readonly folder: string | null; readonly secondRole: boolean };
}

export const startPlace: Place = {
  screen: 'start',
  back: [],
  seriesId: '',
  fields: {},
  chart: null,
  pane: 'main',
  figure: null,
  caution: 0,
  reason: null,
};

/** The interface before anything is known. */
export function initialState(defaults: Defaults, size: State['size']): State {
  return {
    presets: [],
    early: [],
    drafts: [],
    scanners: [],
    scannerChoice: defaults.scanner ?? null,
    siteRules: noSiteRules,
    size,
    nowMs: 0,
    defaults,
    fileNotes: [],
    narrowing: '',
    opened: null,
    session: null,
    past: [],
    future: [],
    place: startPlace,
    entry: null,
    notice: null,
    practiceSinceMs: null,
    rules: new Map(),
    asks: 0,
    open: {},
    recordFailed: false,
    saving: null,
    search: null,
    allWays: false,
    wayScroll: 0,
    front: { which: 'timeSnr', at: 0 },
    lastWay: null,
    taken: null,
    plan: null,
    picture: null,
    pictureEyes: plainEyes,
    carry: null,
    residuals: null,
    shelf: emptyShelf,
    headers: emptyHeaderView,
  };
}
