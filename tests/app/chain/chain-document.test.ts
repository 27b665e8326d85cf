import { describe, expect, it } from 'vitest';
import type { ProblemBody } from '../../../shared/api/problem.ts';
import type { Quantity } from '../../../shared/engine/model/study-model.ts';
import { ChainDocument } from '../../../src/chain/editing/chain-document.ts';
import { conflictFields, mergeConflict } from '../../../src/chain/editing/conflict-fields.ts';
import type { DocumentPorts, Draft, EditRequest, Sent } from '../../../src/chain/editing/document-ports.ts';
import { removeQuantity } from '../../../src/chain/editing/remove-items.ts';
import { analogueChain, ids, studyOf } from './analogue-chain.ts';

type Answer = Sent<{ revision: number; itemRevisions: Record<string, number>; routeStates: Record<string, never> }>;

/** A server that answers what the test hands it, and a clock that runs when the test says so. */
function desk(draft: Draft | null = null, check: DocumentPorts['check'] = () => []) {
  const sent: EditRequest[] = [];
  const answers: ((answer: Answer) => void)[] = [];
  const tasks = new Map<string, () => void>();
  const kept: (Draft | null)[] = [];
  let moved = 0;
  const document = new ChainDocument(
    studyOf(analogueChain),
    {
      send: (request) => {
        sent.push(request);
        return new Promise((resolve) => answers.push(resolve));
      },
      sendLayout: () => Promise.resolve({ ok: true, reply: {} }),
      later: (name, task) => tasks.set(name, task),
      now: () => new Date('2026-03-04T09:12:00Z'),
      check,
      keepDraft: (next) => kept.push(next),
      onMoved: () => {
        moved += 1;
      },
    },
    draft,
  );
  async function answer(reply: Answer): Promise<void> {
    answers.shift()?.(reply);
    await Promise.resolve();
    await Promise.resolve();
  }
  function pause(): void {
    const due = [...tasks.values()];
    tasks.clear();
    for (const task of due) task();
  }
  return { document, sent, kept, answer, pause, moved: () => moved, state: () => document.getState() };
}

const saved = (revision: number, itemRevisions: Record<string, number>): Answer => ({
  ok: true,
  reply: { revision, itemRevisions, routeStates: {} },
});
const refused = (problem: ProblemBody): Answer => ({ ok: false, problem });
const area = () => analogueChain.quantities.find((one) => one.id === ids.area) as Quantity;
const rename = (name: string) => [{ kind: 'quantity' as const, id: ids.area, body: { ...area(), name } }];

describe('history', () => {
  it('undoes and redoes every edit to a deep-equal chain, a deletion with its links and its place', () => {
    const { document, state } = desk();

    document.edit(rename('Wetted area'), 'Changed the name of Coated area');
    document.edit(removeQuantity(state().model, ids.h).edits, 'Removed Heat-transfer coefficient');
    const after = state().model;
    document.undo();
    document.undo();
    expect(state().model).toEqual(analogueChain);
    document.redo();
    document.redo();

    expect(state().model).toEqual(after);
  });

  it('undoes typing as a word, and the next word apart from it', () => {
    const { document, state } = desk();

    for (const text of ['W', 'We', 'Wet']) document.edit(rename(text), 'Changed the name', 'name');
    document.seal();
    document.edit(rename('Wet area'), 'Changed the name', 'name');
    document.undo();
    expect(state().model.quantities.find((one) => one.id === ids.area)?.name).toBe('Wet');
    document.undo();

    expect(state().model).toEqual(analogueChain);
  });

  it('takes one drag back as one entry and sends no edit for it', async () => {
    const { document, state, sent, pause } = desk();

    document.move({ [ids.h]: { x: 10, y: 20 } }, 'Moved Heat-transfer coefficient');
    pause();
    document.undo();

    expect(state().layout).toEqual({});
    expect(sent).toEqual([]);
  });

  it('refuses what makes a new structural error, at once and without a trace', () => {
    const { document, state } = desk(null, (model) =>
      model.quantities.some((one) => one.name === 'Loop') ? ['That closes a loop.'] : [],
    );

    const outcome = document.edit(rename('Loop'), 'Renamed');

    expect(outcome).toEqual({ ok: false, sentence: 'That closes a loop.' });
    expect(state().model).toBe(analogueChain);
    expect(state().undoes).toBeNull();
  });
});

describe('saving', () => {
  it('sends one request at a time, with what changed meanwhile in the next one', async () => {
    const { document, sent, answer, pause, state } = desk();

    document.edit(rename('A1'), 'Changed the name');
    pause();
    document.edit(rename('A2'), 'Changed the name again');
    pause();
    expect(sent).toHaveLength(1);
    expect(state().save.is).toBe('saving');
    await answer(saved(8, { [ids.area]: 2 }));
    expect(state().save.is).toBe('waiting');
    pause();

    expect(sent[1]).toMatchObject({
      summary: 'Changed the name again',
      edits: [{ id: ids.area, expectedRevision: 2, body: { name: 'A2' } }],
    });
    await answer(saved(9, { [ids.area]: 3 }));
    expect(state().save).toEqual({ is: 'saved', at: new Date('2026-03-04T09:12:00Z') });
  });

  it('keeps everything and says so when no answer comes, and saves on the next try', async () => {
    const { document, answer, pause, state, kept, sent } = desk();

    document.edit(rename('Offline'), 'Changed the name');
    pause();
    await answer({ ok: false, problem: null });
    expect(state().save).toEqual({
      is: 'not saved',
      sentence: 'The server did not answer. Your changes are kept here.',
    });
    expect(state().model.quantities.find((one) => one.id === ids.area)?.name).toBe('Offline');
    expect(kept.at(-1)).toMatchObject({ edits: [{ id: ids.area }], expected: { [ids.area]: 1 } });
    void document.flush();
    await answer(saved(8, { [ids.area]: 2 }));

    expect(sent).toHaveLength(2);
    expect(state().save.is).toBe('saved');
    expect(kept.at(-1)).toBeNull();
  });

  it('brings an unsaved draft back after a reload and sends it with the revision it was made on', async () => {
    const draft = {
      edits: rename('From before'),
      expected: { [ids.area]: 1 },
      summaries: ['Changed the name'],
      reasons: {},
    };

    const { state, pause, sent } = desk(draft);
    pause();

    expect(state().model.quantities.find((one) => one.id === ids.area)?.name).toBe('From before');
    expect(sent[0]).toMatchObject({ summary: 'Changed the name', edits: [{ id: ids.area, expectedRevision: 1 }] });
  });

  it('on 409 shows both versions, keeps other edits, and saves the choice on top of theirs', async () => {
    const { document, answer, pause, state, sent } = desk();
    const theirs = { ...area(), name: 'Their name', note: 'Their note' };

    document.edit(rename('My name'), 'Changed the name');
    pause();
    const conflict = { id: ids.area, yours: null, theirs, theirRevision: 5 };
    await answer(refused({ code: 'stale', sentence: 'Somebody else changed it.', conflicts: [conflict] }));
    expect(state().save.is).toBe('conflict');
    const [open] = state().conflicts;
    if (!open) throw new Error('no conflict is open');
    expect(conflictFields(open).map(({ field }) => field)).toEqual(['name', 'note']);
    const body = mergeConflict(open, { name: 'yours', note: 'theirs' });
    document.resolve([{ kind: 'quantity', id: ids.area, body }]);
    pause();

    expect(sent[1]).toMatchObject({
      edits: [{ id: ids.area, expectedRevision: 5, body: { name: 'My name', note: 'Their note' } }],
    });
  });

  it('takes a 409 with the same content on both sides as the answer that was lost', async () => {
    const { document, answer, pause, state, sent } = desk();

    document.edit(rename('Same'), 'Changed the name');
    pause();
    await answer({ ok: false, problem: null });
    void document.flush();
    const conflict = { id: ids.area, yours: null, theirs: { ...area(), name: 'Same' }, theirRevision: 2 };
    await answer(refused({ code: 'stale', sentence: 'Stale.', conflicts: [conflict] }));
    pause();

    expect(state().conflicts).toEqual([]);
    expect(state().save.is).toBe('saved');
    expect(sent).toHaveLength(2);
  });

  it('says the sentence of a refusal and keeps what was typed', async () => {
    const { document, answer, pause, state } = desk();

    document.edit(rename('Refused'), 'Changed the name');
    pause();
    await answer(refused({ code: 'not allowed', sentence: 'You are no longer a member of this study.' }));

    expect(state().save).toEqual({ is: 'not saved', sentence: 'You are no longer a member of this study.' });
    expect(state().model.quantities.find((one) => one.id === ids.area)?.name).toBe('Refused');
    expect(document.isDirty).toBe(true);
  });

  it('asks for the study again when somebody else changed it in between', async () => {
    const { document, answer, pause, moved } = desk();

    document.edit(rename('Mine'), 'Changed the name');
    pause();
    await answer(saved(12, { [ids.area]: 2 }));

    expect(moved()).toBe(1);
  });
});

describe('a newer study from the server', () => {
  it('goes under the unsaved changes, which are then sent with the revisions they were made on', async () => {
    const { document, pause, state, sent } = desk();
    const quantities = analogueChain.quantities.map((one) => (one.id === ids.k ? { ...one, note: 'theirs' } : one));
    const newer = studyOf({ ...analogueChain, quantities }, 9);

    document.edit(rename('Mine'), 'Changed the name');
    document.receive({ ...newer, itemRevisions: { ...newer.itemRevisions, [ids.area]: 4 } });
    pause();

    expect(state().model.quantities.find((one) => one.id === ids.k)?.note).toBe('theirs');
    expect(state().model.quantities.find((one) => one.id === ids.area)?.name).toBe('Mine');
    expect(sent[0]?.edits).toMatchObject([{ id: ids.area, expectedRevision: 1 }]);
  });
});

describe('an approved route', () => {
  it('changes only after a reason was given, and the reason goes along', async () => {
    const { document, pause, sent } = desk();
    const study = studyOf(analogueChain);
    document.receive({
      ...study,
      routeStates: {
        ...study.routeStates,
        [ids.kRoute]: { status: 'approved', revision: 1, submissionId: null, basisChanged: false },
      },
    });
    const route = analogueChain.routes.find((one) => one.id === ids.kRoute);
    if (route?.kind !== 'heat-analogue') throw new Error('the chain has no heat analogue');
    const edits = [{ kind: 'route' as const, id: route.id, body: { ...route, scatter: 0.08 } }];

    expect(document.edit(edits, 'Changed the scatter').ok).toBe(false);
    document.giveReason(ids.kRoute, 'New data of the rig.');
    expect(document.edit(edits, 'Changed the scatter').ok).toBe(true);
    pause();

    expect(sent[0]).toMatchObject({ reason: 'New data of the rig.', edits: [{ id: ids.kRoute }] });
  });
});

describe('what an open submission rests on', () => {
  it('is locked at once, upstream included, and the refusal names the submission', () => {
    const { document, state } = desk();
    const submission = {
      id: 's',
      targetQuantityId: ids.k,
      targetName: 'k_w',
      status: 'open' as const,
      submittedByName: 'E',
      submittedAt: '2026-03-04T09:12:00Z',
    };
    document.receive({ ...studyOf(analogueChain), submissions: [submission] });

    const h = analogueChain.quantities.find((one) => one.id === ids.h) as Quantity;
    const outcome = document.edit([{ kind: 'quantity', id: h.id, body: { ...h, note: 'later' } }], 'Changed the note');

    expect(outcome).toMatchObject({ ok: false, sentence: expect.stringContaining('submission of k_w') });
    expect(state().frozen.has(ids.time)).toBe(false);
    expect(document.edit(rename('Free'), 'Changed the name').ok).toBe(true);
  });
});
