import type { ProblemBody } from '../../../shared/api/problem.ts';
import type { ChainEdit, RouteState, Study } from '../../../shared/api/studies.ts';
import { chainItemSchema } from '../../../shared/domain/audit-events.ts';
import type { StudyModel } from '../../../shared/engine/model/study-model.ts';
import type { Layout } from '../lanes.ts';
import { applyEdits, changedItems, type ItemBody, type ItemEdit, invertEdits, sameContent } from './chain-edits.ts';
import type { DocumentPorts, Draft, EditReply } from './document-ports.ts';
import { frozenItems } from './frozen-items.ts';

export type SaveState =
  | { readonly is: 'saved'; readonly at: Date | null }
  | { readonly is: 'waiting' | 'saving' }
  | { readonly is: 'not saved'; readonly sentence: string }
  | { readonly is: 'conflict' };

export type Conflict = {
  readonly kind: ItemEdit['kind'];
  readonly id: string;
  readonly yours: ItemBody | null;
  readonly theirs: ItemBody | null;
  readonly theirRevision: number;
};

type Entry = {
  readonly summary: string;
  readonly key: string | null;
  readonly edits: readonly ItemEdit[];
  readonly inverse: readonly ItemEdit[];
  readonly layout: { readonly before: Layout; readonly after: Layout } | null;
};

export type ChainState = {
  readonly model: StudyModel;
  readonly layout: Layout;
  readonly revision: number;
  readonly routeStates: Readonly<Record<string, RouteState>>;
  readonly reasons: Readonly<Record<string, string>>;
  /** By id of what lies in an open submission: the name of its target. */
  readonly frozen: ReadonlyMap<string, string>;
  readonly save: SaveState;
  readonly conflicts: readonly Conflict[];
  readonly undoes: string | null;
  readonly redoes: string | null;
};

export type EditOutcome = { readonly ok: true } | { readonly ok: false; readonly sentence: string };
const done: EditOutcome = { ok: true };

/**
 * The chain under the engineer's hands: a draft over what the server has, its history of inverse edits, and one
 * queue that saves the difference. Undo is local and knows nothing of saving; saving knows nothing of undo.
 */
export class ChainDocument {
  private saved: StudyModel;
  private itemRevisions: Record<string, number>;
  private past: Entry[] = [];
  private future: Entry[] = [];
  private unsent: string[] = [];
  private sending = false;
  private sealed = true;
  private readonly listeners = new Set<() => void>();
  private state: ChainState;

  constructor(
    study: Study,
    private readonly ports: DocumentPorts,
    draft: Draft | null = null,
  ) {
    this.saved = study.model;
    this.itemRevisions = { ...study.itemRevisions, ...draft?.expected };
    this.unsent = [...(draft?.summaries ?? [])];
    this.state = {
      model: draft ? applyEdits(study.model, draft.edits) : study.model,
      layout: study.layout,
      revision: study.revision,
      routeStates: study.routeStates,
      reasons: draft?.reasons ?? {},
      frozen: frozenItems(study),
      save: { is: 'saved', at: null },
      conflicts: [],
      undoes: null,
      redoes: null,
    };
    if (draft && draft.edits.length > 0) {
      this.state = { ...this.state, save: { is: 'waiting' } };
      ports.later('save', () => void this.flush());
    }
  }

  readonly subscribe = (listener: () => void) => {
    this.listeners.add(listener);
    return () => this.listeners.delete(listener);
  };
  readonly getState = () => this.state;

  get isDirty(): boolean {
    return this.state.save.is !== 'saved';
  }

  private set(change: Partial<ChainState>): void {
    this.state = {
      ...this.state,
      ...change,
      undoes: this.past.at(-1)?.summary ?? null,
      redoes: this.future.at(-1)?.summary ?? null,
    };
    for (const listener of this.listeners) listener();
  }

  /** Why the edits may not be made, or null. New errors only: an old one elsewhere does not stop work here. */
  private refusal(edits: readonly ItemEdit[], next: StudyModel): string | null {
    for (const edit of edits) {
      const target = this.state.frozen.get(edit.id);
      if (target !== undefined) {
        return `This is part of the submission of ${target}, which is in review. Withdraw the submission to change it.`;
      }
      const state = edit.kind === 'route' ? this.state.routeStates[edit.id] : undefined;
      if (state?.status === 'in review')
        return 'This route is in review. Withdraw the submission before you change it.';
      if (state?.status === 'approved' && !this.state.reasons[edit.id]) {
        return 'This route is approved. Open a new revision and give the reason before you change it.';
      }
    }
    for (const edit of edits) {
      if (edit.body === null) continue;
      const read = chainItemSchema.safeParse({ kind: edit.kind, body: edit.body });
      const issue = read.error?.issues[0];
      if (issue) return `${String(issue.path.at(-1) ?? edit.kind)}: ${issue.message}`;
    }
    const known = new Set(this.ports.check(this.state.model));
    return this.ports.check(next).find((sentence) => !known.has(sentence)) ?? null;
  }

  /**
   * Makes the edits, or refuses with a sentence and changes nothing. Consecutive edits with the same `key` are one
   * entry of the history until `seal` is called, so that a word typed is undone as a word.
   */
  edit(edits: readonly ItemEdit[], summary: string, key: string | null = null): EditOutcome {
    const next = applyEdits(this.state.model, edits);
    const sentence = this.refusal(edits, next);
    if (sentence !== null) return { ok: false, sentence };
    const last = this.past.at(-1);
    const inverse = invertEdits(this.state.model, edits);
    if (key !== null && !this.sealed && last?.key === key) {
      this.past[this.past.length - 1] = {
        ...last,
        edits: [...last.edits, ...edits],
        inverse: [...inverse, ...last.inverse],
      };
    } else {
      this.past.push({ summary, key, edits, inverse, layout: null });
    }
    this.sealed = false;
    this.future = [];
    this.noteUnsent(summary);
    this.change(next);
    return done;
  }

  /** Ends a run of typing: the next edit with the same key is an entry of its own. */
  seal(): void {
    this.sealed = true;
  }

  /** Moves nodes: one entry for one drag. Positions are layout, not record. */
  move(after: Layout, summary: string): void {
    const before = this.state.layout;
    this.past.push({ summary, key: null, edits: [], inverse: [], layout: { before, after } });
    this.future = [];
    this.place(after);
  }

  undo(): void {
    this.step(this.past, this.future, 'inverse', 'before', 'Undid: ');
  }

  redo(): void {
    this.step(this.future, this.past, 'edits', 'after', 'Redid: ');
  }

  private step(
    from: Entry[],
    to: Entry[],
    edits: 'edits' | 'inverse',
    place: 'before' | 'after',
    prefix: string,
  ): void {
    const entry = from.at(-1);
    if (!entry) return;
    const next = applyEdits(this.state.model, entry[edits]);
    const sentence = this.refusal(entry[edits], next);
    if (sentence !== null) {
      this.set({ save: { is: 'not saved', sentence } });
      return;
    }
    from.pop();
    to.push(entry);
    this.sealed = true;
    if (entry.layout) this.place(entry.layout[place]);
    if (entry.edits.length > 0) {
      this.noteUnsent(`${prefix}${entry.summary}`);
      this.change(next);
    } else {
      this.set({});
    }
  }

  private noteUnsent(summary: string): void {
    if (this.unsent.at(-1) !== summary) this.unsent.push(summary);
  }

  private place(layout: Layout): void {
    this.set({ layout });
    this.ports.later('layout', () => void this.flushLayout());
  }

  private async flushLayout(): Promise<void> {
    const result = await this.ports.sendLayout(this.state.layout);
    if (!result.ok && this.state.save.is === 'saved') {
      const sentence = 'The positions on the sheet are not saved; they are sent again with the next move.';
      this.set({ save: { is: 'not saved', sentence: result.problem?.sentence ?? sentence } });
    }
  }

  private change(model: StudyModel): void {
    this.set({ model, save: this.sending ? { is: 'saving' } : { is: 'waiting' } });
    this.keep();
    this.ports.later('save', () => void this.flush());
  }

  private keep(): void {
    const edits = changedItems(this.saved, this.state.model);
    if (edits.length === 0) {
      this.ports.keepDraft(null);
      return;
    }
    const expected = Object.fromEntries(edits.map((edit) => [edit.id, this.itemRevisions[edit.id] ?? 0]));
    this.ports.keepDraft({ edits, expected, summaries: this.unsent, reasons: this.state.reasons });
  }

  /** Opens a new revision of an approved route: from now on its fields may change. */
  giveReason(routeId: string, reason: string): void {
    this.set({ reasons: { ...this.state.reasons, [routeId]: reason } });
  }

  /** Sends what differs from the server, one request at a time. */
  async flush(): Promise<void> {
    if (this.sending || this.state.save.is === 'conflict') return;
    const sent = this.state.model;
    const changes = changedItems(this.saved, sent);
    if (changes.length === 0) {
      this.unsent = [];
      this.ports.keepDraft(null);
      this.set({ save: { is: 'saved', at: this.ports.now() } });
      return;
    }
    const edits = changes.map(
      ({ kind, id, body }): ChainEdit => ({ kind, id, body, expectedRevision: this.itemRevisions[id] ?? 0 }),
    );
    const noted = this.unsent.length;
    const reasons = edits.flatMap((edit) => this.state.reasons[edit.id] ?? []);
    this.sending = true;
    this.set({ save: { is: 'saving' } });
    const result = await this.ports.send({ summary: this.summary(), reason: [...new Set(reasons)].join(' '), edits });
    this.sending = false;
    if (result.ok) this.accept(result.reply, sent, edits, noted);
    else this.refused(result.problem, edits);
  }

  private summary(): string {
    const words = this.unsent.length > 0 ? this.unsent.join('; ') : 'Changed the chain';
    return words.length > 300 ? `${words.slice(0, 297)}…` : words;
  }

  private accept(reply: EditReply, sent: StudyModel, edits: readonly ChainEdit[], noted: number): void {
    const moved = reply.revision > this.state.revision + 1;
    this.saved = sent;
    this.unsent = this.unsent.slice(noted);
    // Only what was sent: another item's newer revision would let a later edit overwrite what was never seen.
    for (const { id, body } of edits) {
      if (body === null) delete this.itemRevisions[id];
      else this.itemRevisions[id] = reply.itemRevisions[id] ?? (this.itemRevisions[id] ?? 0) + 1;
    }
    const changedAgain = this.state.model !== sent;
    const reasons = Object.entries(this.state.reasons).filter(([id]) => !edits.some((edit) => edit.id === id));
    this.set({
      revision: reply.revision,
      routeStates: { ...this.state.routeStates, ...reply.routeStates },
      // A reason opens a route once; when it is approved again the next change needs its own.
      reasons: Object.fromEntries(reasons),
      save: changedAgain ? { is: 'waiting' } : { is: 'saved', at: this.ports.now() },
    });
    this.keep();
    if (changedAgain) this.ports.later('save', () => void this.flush());
    if (moved) this.ports.onMoved();
  }

  private refused(problem: ProblemBody | null, edits: readonly ChainEdit[]): void {
    if (problem === null) {
      this.set({ save: { is: 'not saved', sentence: 'The server did not answer. Your changes are kept here.' } });
      return;
    }
    if (problem.code !== 'stale' || !problem.conflicts) {
      this.set({ save: { is: 'not saved', sentence: problem.sentence } });
      return;
    }
    const conflicts = problem.conflicts.map(
      ({ id, theirs, theirRevision }): Conflict => ({
        kind: edits.find((edit) => edit.id === id)?.kind ?? 'quantity',
        id,
        yours: edits.find((edit) => edit.id === id)?.body ?? null,
        theirs: (theirs ?? null) as ItemBody | null,
        theirRevision,
      }),
    );
    // The answer of an earlier save was lost, or both wrote the same: nothing to choose.
    const open = conflicts.filter((conflict) => !sameContent(conflict.yours, conflict.theirs));
    if (open.length === 0)
      this.takeTheirs(
        conflicts,
        conflicts.map(({ kind, id, yours }) => ({ kind, id, body: yours })),
      );
    else this.set({ save: { is: 'conflict' }, conflicts });
  }

  /** Ends a conflict with one body for each item; nothing else of the draft changes. */
  resolve(chosen: readonly ItemEdit[]): void {
    this.takeTheirs(this.state.conflicts, chosen);
  }

  private takeTheirs(conflicts: readonly Conflict[], chosen: readonly ItemEdit[]): void {
    this.saved = applyEdits(
      this.saved,
      conflicts.map(({ kind, id, theirs }) => ({ kind, id, body: theirs })),
    );
    for (const { id, theirs, theirRevision } of conflicts) {
      if (theirs === null) delete this.itemRevisions[id];
      else this.itemRevisions[id] = theirRevision;
    }
    this.forgetHistory();
    this.set({ conflicts: [], model: applyEdits(this.state.model, chosen), save: { is: 'waiting' } });
    this.keep();
    this.ports.later('save', () => void this.flush());
    this.ports.onMoved();
  }

  /** An inverse holds whole items: after somebody else's change it would take that change back too. */
  private forgetHistory(): void {
    this.past = [];
    this.future = [];
  }

  /** Takes a newer state of the study from the server and puts the unsaved changes on top of it. */
  receive(study: Study): void {
    if (this.sending || this.state.save.is === 'conflict' || study.revision < this.state.revision) return;
    if (study.revision === this.state.revision) {
      this.set({ routeStates: study.routeStates, frozen: frozenItems(study) });
      return;
    }
    const mine = changedItems(this.saved, this.state.model);
    const unsaved = new Set(mine.map((edit) => edit.id));
    const kept = Object.entries(this.itemRevisions).filter(([id]) => unsaved.has(id));
    this.itemRevisions = { ...study.itemRevisions, ...Object.fromEntries(kept) };
    this.saved = study.model;
    this.forgetHistory();
    this.set({
      model: applyEdits(study.model, mine),
      revision: study.revision,
      routeStates: study.routeStates,
      frozen: frozenItems(study),
      layout: { ...study.layout, ...this.state.layout },
    });
  }
}
