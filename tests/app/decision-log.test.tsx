import { cleanup, screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, describe, expect, it, vi } from 'vitest';
import type { LogEntry } from '../../shared/api/decision-log.ts';
import type { StudySummary } from '../../shared/api/studies.ts';
import { type AuditEvent, auditEventSchema } from '../../shared/domain/audit-events.ts';
import { entrySentence, studyEventNames } from '../../src/features/decision-log/entry-sentence.ts';
import { answerFetch, openApp, personWith, refuse, sessionOf } from './open-app.tsx';

afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

const studyId = '40000000-0000-4000-8000-000000000001';
const auditor = personWith({ name: 'Lena Frey', memberships: { [studyId]: 'auditor' } });
const log = `/studies/${studyId}/log`;
const summary: StudySummary = {
  id: studyId,
  title: 'Wall-coated tube',
  question: '',
  myRole: 'auditor',
  quantityCount: 4,
  approvedCount: 1,
  inReviewCount: 0,
  changedAt: '2026-03-04T09:12:00.000Z',
};
const named = { 'GET /api/studies': () => ({ studies: [summary] }) };
const list = `GET /api/studies/${studyId}/decision-log`;
const verification = `POST /api/studies/${studyId}/decision-log/verifications`;

const submission = { submissionId: 'p1', targetName: 'Time to dissolve', routeIds: ['r1', 'r2'] };
const ruling = { ruling: 'accepted', comment: '', condition: null } as const;
const rights = { isAdministrator: false, isAuditor: false, isActive: true };

const sentences: readonly [AuditEvent, string][] = [
  [{ event: 'study.created', study: { title: 'Tube', question: '' } }, 'created the study "Tube"'],
  [
    { event: 'study.renamed', before: { title: 'Tube', question: '' }, after: { title: 'Coil', question: '' } },
    'renamed the study to "Coil"',
  ],
  [
    { event: 'member.added', personId: 'a', name: 'Sven Maurer', role: 'manager' },
    'made Sven Maurer technical manager of the study',
  ],
  [
    { event: 'member.removed', personId: 'a', name: 'Sven Maurer', role: 'auditor' },
    'removed Sven Maurer, auditor, from the study',
  ],
  [{ event: 'chain.edited', summary: 'Changed Rig', reason: '', changes: [] }, 'changed Rig'],
  [
    { event: 'chain.edited', summary: 'Changed Rig', reason: 'run 7 was repeated', changes: [] },
    'changed Rig, because: run 7 was repeated',
  ],
  [
    { event: 'submission.opened', ...submission, targetQuantityId: 'q1', snapshotHash: 'ab', note: '' },
    'submitted Time to dissolve for review (2 routes)',
  ],
  [
    {
      event: 'submission.opened',
      ...submission,
      routeIds: ['r1'],
      targetQuantityId: 'q1',
      snapshotHash: 'ab',
      note: '',
    },
    'submitted Time to dissolve for review (1 route)',
  ],
  [
    {
      event: 'assumption.ruled',
      submissionId: 'p1',
      routeId: 'r1',
      assumptionKey: 'regime',
      statement: 'Both ends are in the same flow regime.',
      before: null,
      after: { ...ruling, ruling: 'refused' },
    },
    'ruled "refused" on: Both ends are in the same flow regime.',
  ],
  [
    { event: 'submission.signed', ...submission, snapshotHash: 'ab', signerName: 'Sven Maurer', meaning: 'I approve.' },
    'signed Time to dissolve: I approve.',
  ],
  [
    { event: 'submission.returned', ...submission, comments: 'Cite the table.' },
    'returned Time to dissolve: Cite the table.',
  ],
  [
    { event: 'submission.withdrawn', ...submission, reason: 'New readings.' },
    'withdrew the submission of Time to dissolve: New readings.',
  ],
  [{ event: 'log.verified', entries: 12, headHash: 'ab', whole: true }, 'verified the decision log: 12 entries, whole'],
  [
    { event: 'log.verified', entries: 12, headHash: 'ab', whole: false },
    'verified the decision log and found it broken',
  ],
  [
    { event: 'administrator.set-up', personId: 'a', name: 'Ada Lind', email: 'ada@example.test' },
    'set up Stemma as administrator Ada Lind',
  ],
  [
    {
      event: 'person.invited',
      personId: 'a',
      name: 'Ada Lind',
      email: 'ada@example.test',
      isAdministrator: false,
      isAuditor: true,
    },
    'invited Ada Lind (ada@example.test)',
  ],
  [
    {
      event: 'person.changed',
      personId: 'a',
      before: { name: 'Ada Lind', ...rights },
      after: { name: 'Ada Berg', ...rights },
    },
    'changed the account of Ada Berg',
  ],
  [{ event: 'person.signed-in', personId: 'a' }, 'signed in'],
  [{ event: 'password.set', personId: 'a' }, 'set a new password'],
];

function entry(seq: number, event: AuditEvent): LogEntry {
  return { seq, at: '2026-03-04 09:12:33.123456', actorId: 'a', actorName: 'Ines Roth', event, hash: 'ab'.repeat(32) };
}
const created = entry(1, { event: 'study.created', study: { title: 'Tube', question: '' } });
const edited = entry(2, {
  event: 'chain.edited',
  summary: 'Changed Rig',
  reason: '',
  changes: [
    {
      kind: 'operating-point',
      id: 'x',
      before: { id: 'x', name: 'Rig', fluid: 'water' },
      after: { id: 'x', name: 'Rig', fluid: 'brine' },
    },
    { kind: 'route', id: 'y', before: null, after: { id: 'y', name: 'Balance' } },
  ],
});

describe('the sentence of an entry', () => {
  it.each(sentences)('says what happened: %o', (event, sentence) => {
    expect(entrySentence(event)).toBe(sentence);
  });

  it('is pinned above for every kind of entry there is', () => {
    const kinds = auditEventSchema.options.map((option) => option.shape.event.value);

    expect(new Set(sentences.map(([event]) => event.event))).toEqual(new Set(kinds));
    expect(kinds).toEqual(expect.arrayContaining(Object.keys(studyEventNames)));
  });
});

describe('the decision log', () => {
  it('names its study and opens what an entry changed, field by field, and leaves out what stayed', async () => {
    answerFetch({
      'GET /api/session': sessionOf(auditor),
      ...named,
      [list]: () => ({ entries: [edited, created], total: 2, hasMore: false }),
    });
    openApp(log);

    await screen.findByRole('heading', { name: 'Decision log of Wall-coated tube' });
    const [newest] = await screen.findAllByRole('listitem');
    if (!newest) throw new Error('The log should have entries.');
    expect(newest.textContent).toContain('Ines Roth changed Rig');
    await userEvent.click(within(newest).getByText('Before and after'));

    const table = await within(newest).findByRole('table', { name: 'Operating point "Rig" changed' });
    expect(
      within(table)
        .getAllByRole('row')
        .slice(1)
        .map((row) => row.textContent),
    ).toEqual(['fluidwaterbrine']);
    expect(within(newest).getByRole('table', { name: 'Route "Balance" added' })).toBeDefined();
  });

  it('keeps its filters in the address and asks the server with them', async () => {
    const asked = answerFetch({
      'GET /api/session': sessionOf(auditor),
      ...named,
      [list]: ({ path }) => ({ entries: path.includes('text=nowhere') ? [] : [created], total: 1, hasMore: false }),
    });
    const app = openApp(`${log}?event=chain.edited`);

    expect(((await screen.findByLabelText('What happened')) as HTMLSelectElement).value).toBe('chain.edited');
    await userEvent.type(screen.getByLabelText('Text in it'), 'nowhere');

    expect(await screen.findByText(/No entry fits/)).toBeDefined();
    expect(app.address()).toBe(`${log}?event=chain.edited&text=nowhere`);
    expect(asked.at(-1)?.path).toBe(`/api/studies/${studyId}/decision-log?event=chain.edited&text=nowhere`);
  });

  it('goes on with older entries from the last one shown', async () => {
    const asked = answerFetch({
      'GET /api/session': sessionOf(auditor),
      ...named,
      [list]: ({ path }) =>
        path.includes('before=2')
          ? { entries: [created], total: 2, hasMore: false }
          : { entries: [edited], total: 2, hasMore: true },
    });
    openApp(log);

    await userEvent.click(await screen.findByRole('button', { name: 'Show older entries' }));

    expect(await screen.findByText(/created the study/)).toBeDefined();
    expect(screen.getByText(/changed Rig/)).toBeDefined();
    expect(asked.at(-1)?.path).toContain('before=2');
    expect(screen.queryByRole('button', { name: 'Show older entries' })).toBeNull();
  });

  it.each([
    [null, 'Whole: 2 entries, last hash abababababababab'],
    [{ seq: 2, sentence: 'Its hash does not follow.' }, 'Broken at entry 2: Its hash does not follow.'],
  ])('says after a verification whether it is whole or where it broke (%o)', async (broken, sentence) => {
    answerFetch({
      'GET /api/session': sessionOf(auditor),
      ...named,
      [list]: () => ({ entries: [created], total: 1, hasMore: false }),
      [verification]: () => ({
        whole: broken === null,
        entries: 2,
        headHash: 'ab'.repeat(32),
        verifiedAt: '2026-03-04T09:12:00.000Z',
        broken,
      }),
    });
    openApp(log);

    await userEvent.click(await screen.findByRole('button', { name: 'Verify the log' }));

    const region = screen.getByRole('region', { name: 'Verification' });
    expect(
      await within(region).findByText((_, element) => element?.tagName === 'P' && element.textContent === sentence),
    ).toBeDefined();
  });

  it('says why an engineer may not verify it', async () => {
    answerFetch({
      'GET /api/session': sessionOf(personWith({ memberships: { [studyId]: 'engineer' } })),
      ...named,
      [list]: () => ({ entries: [created], total: 1, hasMore: false }),
    });
    openApp(log);

    const button = (await screen.findByRole('button', { name: 'Verify the log' })) as HTMLButtonElement;

    expect(button.disabled).toBe(true);
    expect(document.getElementById(button.getAttribute('aria-describedby') ?? '')?.textContent).toBe(
      'Only an auditor of this study may verify the decision log; you are its scale-up engineer.',
    );
  });

  it('says that a study is closed to who is not a member, instead of an empty log', async () => {
    answerFetch({
      'GET /api/session': sessionOf(personWith()),
      ...named,
      [list]: () => refuse({ code: 'not found', sentence: 'There is no such study among yours.' }),
    });
    openApp(log);

    expect((await screen.findByRole('alert')).textContent).toContain('There is no such study among yours.');
    expect(screen.queryByText(/No entry fits/)).toBeNull();
  });
});
