import type { ProblemBody } from '../../../shared/api/problem.ts';
import type { ChainEdit, RouteState } from '../../../shared/api/studies.ts';
import type { StudyModel } from '../../../shared/engine/model/study-model.ts';
import type { Layout } from '../lanes.ts';
import type { ItemEdit } from './chain-edits.ts';

export type EditRequest = { readonly summary: string; readonly reason: string; readonly edits: ChainEdit[] };
export type EditReply = {
  revision: number;
  itemRevisions: Record<string, number>;
  routeStates: Record<string, RouteState>;
};
/** `problem` null: no answer came, so whether it was saved is open. */
export type Sent<T> =
  | { readonly ok: true; readonly reply: T }
  | { readonly ok: false; readonly problem: ProblemBody | null };

/** What is not saved yet, kept in the browser so that a reload loses nothing. */
export type Draft = {
  readonly edits: readonly ItemEdit[];
  readonly expected: Readonly<Record<string, number>>;
  readonly summaries: readonly string[];
  readonly reasons: Readonly<Record<string, string>>;
};

export type DocumentPorts = {
  readonly send: (request: EditRequest) => Promise<Sent<EditReply>>;
  readonly sendLayout: (layout: Layout) => Promise<Sent<object>>;
  /** Runs the task after a pause; a second call for the same name before that replaces the first. */
  readonly later: (name: 'save' | 'layout', task: () => void) => void;
  readonly now: () => Date;
  /** Structural errors of a model in words: loops, dangling references, balances that do not add up. */
  readonly check: (model: StudyModel) => readonly string[];
  readonly keepDraft: (draft: Draft | null) => void;
  /** Somebody else changed the study. */
  readonly onMoved: () => void;
};
