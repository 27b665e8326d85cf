import { cleanup, screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { type Submission, signatureMeanings } from '../../shared/api/submissions.ts';
import type { Ruling } from '../../shared/domain/audit-events.ts';
import { evaluateStudy } from '../../shared/engine/evaluate/evaluate-study.ts';
import type { StudyModel } from '../../shared/engine/model/study-model.ts';
import { analogueChain, ids } from './chain/analogue-chain.ts';
import { type Answer, answerFetch, openApp, personWith, refuse, sessionOf } from './open-app.tsx';

afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

const studyId = '40000000-0000-4000-8000-000000000001';
const id = '60000000-0000-4000-8000-000000000001';
const at = '2026-03-04T09:12:00.000Z';
const evidence = 'The evidence supports both the value and its uncertainty, at this operating point.';
const manager = personWith({ name: 'Sven Maurer', memberships: { [studyId]: 'manager' } });
const author = personWith({ personId: '50000000-0000-4000-8000-000000000002', memberships: { [studyId]: 'engineer' } });

function snapshotOf(model: StudyModel, routeIds: string[]): Submission['snapshot'] {
  return {
    format: 'stemma-snapshot',
    version: 1,
    studyId,
    studyTitle: 'Wall-coated tube',
    targetQuantityId: ids.h,
    routeIds,
    model,
    evaluation: evaluateStudy(model),
  };
}

function submissionWith(change: Partial<Submission> = {}): Submission {
  return {
    id,
    studyId,
    studyTitle: 'Wall-coated tube',
    status: 'open',
    note: '',
    submittedById: author.personId,
    submittedByName: author.name,
    submittedAt: at,
    snapshot: snapshotOf(analogueChain, [ids.hRoute, ids.areaRoute]),
    snapshotHash: 'ab'.repeat(32),
    signedBefore: null,
    movedSince: [],
    authorIds: [author.personId],
    rulings: [],
    signatures: [],
    outcome: null,
    ...change,
  };
}

const ruled = (routeId: string, ruling: Ruling) => ({
  routeId,
  assumptionKey: 'evidence',
  ruling,
  byName: manager.name,
  at,
});
const accepted: Ruling = { ruling: 'accepted', comment: '', condition: null };

/** A server that keeps one submission, as far as the page needs it. */
function keep(start: Submission, actor = manager, more: Readonly<Record<string, Answer>> = {}) {
  let now = start;
  const change = (next: Partial<Submission>) => {
    now = { ...now, ...next };
    return now;
  };
  return answerFetch({
    'GET /api/session': sessionOf(actor),
    [`GET /api/submissions/${id}`]: () => now,
    [`PUT /api/submissions/${id}/rulings`]: ({ body }) => {
      const { routeId, ruling } = body as { routeId: string; ruling: Ruling };
      return change({ rulings: [...now.rulings.filter((one) => one.routeId !== routeId), ruled(routeId, ruling)] });
    },
    [`POST /api/submissions/${id}/signatures`]: ({ body }) => {
      const { meaning, snapshotHash } = body as { meaning: string; snapshotHash: string };
      return change({
        status: 'signed',
        signatures: [{ signerName: manager.name, meaning, signedAt: at, snapshotHash }],
      });
    },
    [`POST /api/submissions/${id}/returns`]: ({ body }) =>
      change({ status: 'returned', outcome: { byName: manager.name, at, ...(body as { comments: string }) } }),
    ...more,
  });
}

const open = () => openApp(`/submissions/${id}`);
const rulingForms = () => screen.findAllByRole('form', { name: `Ruling on: ${evidence}` });
const signButton = () => screen.getByRole('button', { name: 'Sign' }) as HTMLButtonElement;

describe('reviewing a submission', () => {
  it('signs what was on screen once every assumption has a ruling, and not before', async () => {
    const asked = keep(submissionWith());
    open();

    const [first, second] = await rulingForms();
    if (!first || !second) throw new Error('The package should have two assumptions.');
    expect(signButton().disabled).toBe(true);
    expect(screen.getByText('Rule on every assumption first: 0 of 2 have a ruling.')).toBeDefined();

    await userEvent.click(within(first).getByRole('radio', { name: 'accepted' }));
    expect(await screen.findByText('Rule on every assumption first: 1 of 2 have a ruling.')).toBeDefined();
    await userEvent.click(within(second).getByRole('radio', { name: 'accepted' }));
    await waitFor(() => expect(signButton().disabled).toBe(false));

    await userEvent.click(screen.getByRole('radio', { name: signatureMeanings[1] }));
    await userEvent.type(screen.getByLabelText('Your password'), 'four words make a password');
    await userEvent.click(signButton());

    expect(await screen.findByRole('heading', { name: 'Signed by Sven Maurer' })).toBeDefined();
    expect(asked.find((one) => one.path.endsWith('/signatures'))?.body).toEqual({
      password: 'four words make a password',
      meaning: signatureMeanings[1],
      snapshotHash: 'ab'.repeat(32),
    });
    expect(screen.queryByRole('button', { name: 'Sign' })).toBeNull();
  });

  it('does not sign while an assumption is refused', async () => {
    keep(
      submissionWith({
        rulings: [
          ruled(ids.hRoute, accepted),
          ruled(ids.areaRoute, { ...accepted, ruling: 'refused', comment: 'No source.' }),
        ],
      }),
    );
    open();

    expect(await screen.findByText(/An assumption is refused\. Return the submission/)).toBeDefined();
    expect(signButton().disabled).toBe(true);
    expect(screen.getByText('“No source.”')).toBeDefined();
  });

  it('keeps a condition with its text and date, and asks for both', async () => {
    const asked = keep(submissionWith());
    open();
    const [form] = await rulingForms();
    if (!form) throw new Error('The package should have an assumption.');

    await userEvent.click(within(form).getByRole('radio', { name: 'accepted on condition' }));
    expect((within(form).getByLabelText('Condition') as HTMLInputElement).required).toBe(true);
    expect((within(form).getByLabelText('Due on') as HTMLInputElement).required).toBe(true);
    await userEvent.type(within(form).getByLabelText('Condition'), 'Repeat run 7');
    await userEvent.type(within(form).getByLabelText('Due on'), '2026-04-01');
    await userEvent.click(within(form).getByRole('button', { name: 'Keep the ruling' }));

    expect(await screen.findByText('Condition: Repeat run 7, due on 2026-04-01')).toBeDefined();
    expect(asked.find((one) => one.method === 'PUT')?.body).toMatchObject({
      assumptionKey: 'evidence',
      ruling: { ruling: 'accepted on condition', condition: { text: 'Repeat run 7', dueOn: '2026-04-01' } },
    });
  });

  it('offers to keep an acceptance again when the server did not take it', async () => {
    let isDown = true;
    const taken = submissionWith({ rulings: [ruled(ids.hRoute, accepted)] });
    keep(submissionWith(), manager, {
      [`PUT /api/submissions/${id}/rulings`]: () =>
        isDown ? refuse({ code: 'unavailable', sentence: 'The database does not answer.' }) : taken,
    });
    open();
    const [form] = await rulingForms();
    if (!form) throw new Error('The package should have an assumption.');

    await userEvent.click(within(form).getByRole('radio', { name: 'accepted' }));
    expect((await within(form).findByRole('alert')).textContent).toContain('The database does not answer.');
    isDown = false;
    await userEvent.click(within(form).getByRole('button', { name: 'Keep the ruling' }));

    expect(await screen.findByText('Rule on every assumption first: 1 of 2 have a ruling.')).toBeDefined();
  });

  it('asks for the password again after a wrong one and keeps the meaning', async () => {
    keep(submissionWith({ rulings: [ruled(ids.hRoute, accepted), ruled(ids.areaRoute, accepted)] }), manager, {
      [`POST /api/submissions/${id}/signatures`]: () =>
        refuse({ code: 'not allowed', sentence: 'The password is not right.' }),
    });
    open();

    await userEvent.click(await screen.findByRole('radio', { name: signatureMeanings[1] }));
    await userEvent.type(screen.getByLabelText('Your password'), 'something else entirely');
    await userEvent.click(signButton());

    expect((await screen.findByRole('alert')).textContent).toContain('The password is not right.');
    expect((screen.getByLabelText('Your password') as HTMLInputElement).value).toBe('');
    expect((screen.getByRole('radio', { name: signatureMeanings[1] }) as HTMLInputElement).checked).toBe(true);
  });

  it('returns with the comments, which stay in the box while the server refuses', async () => {
    let isDown = true;
    keep(submissionWith(), manager, {
      [`POST /api/submissions/${id}/returns`]: ({ body }) =>
        isDown
          ? refuse({ code: 'unavailable', sentence: 'The database does not answer.' })
          : submissionWith({
              status: 'returned',
              outcome: { byName: manager.name, at, ...(body as { comments: string }) },
            }),
    });
    open();
    const box = (await screen.findByLabelText('Comments to the author')) as HTMLTextAreaElement;

    await userEvent.type(box, 'Cite the table of the viscosity.');
    await userEvent.click(screen.getByRole('button', { name: 'Return with comments' }));
    expect((await screen.findByRole('alert')).textContent).toContain('The database does not answer.');
    expect(box.value).toBe('Cite the table of the viscosity.');
    isDown = false;
    await userEvent.click(screen.getByRole('button', { name: 'Return with comments' }));

    expect(await screen.findByRole('heading', { name: 'Returned by Sven Maurer' })).toBeDefined();
    expect(screen.getByText('“Cite the table of the viscosity.”')).toBeDefined();
  });

  it('warns when the chain moved after it was submitted, and names what moved', async () => {
    keep(submissionWith({ movedSince: ['Coated area', 'Rig'] }));
    open();

    expect((await screen.findByRole('alert')).textContent).toContain('Coated area, Rig');
  });

  it('lets the author withdraw and neither rule nor sign', async () => {
    keep(submissionWith(), author);
    open();

    expect(await screen.findByRole('button', { name: 'Withdraw the submission' })).toBeDefined();
    expect(screen.queryByRole('form', { name: /^Ruling on/ })).toBeNull();
    expect(screen.queryByRole('button', { name: 'Sign' })).toBeNull();
    expect(screen.getByText(/Only a technical manager of this study may rule on assumptions/)).toBeDefined();
  });

  it('does not let a manager rule on or sign what he worked on', async () => {
    keep(submissionWith({ authorIds: [author.personId, manager.personId] }));
    open();

    expect(await screen.findByText('You worked on this package, so somebody else must sign it.')).toBeDefined();
    expect(signButton().disabled).toBe(true);
    expect(screen.queryByRole('form', { name: /^Ruling on/ })).toBeNull();
  });

  function chainWithArea(change: { value?: number; evidence?: string }): StudyModel {
    const model = structuredClone(analogueChain);
    const area = model.routes.find((route) => route.id === ids.areaRoute);
    if (area?.kind !== 'stated-value' || !area.value) throw new Error('The area should be stated.');
    area.value.value = change.value ?? area.value.value;
    area.evidence = change.evidence ?? area.evidence;
    return model;
  }

  it('shows what was signed last, what it is now and the change in per cent, and hides what stayed', async () => {
    keep(submissionWith({ signedBefore: snapshotOf(chainWithArea({ value: 10 }), [ids.areaRoute]) }));
    open();

    const table = await screen.findByRole('table', { name: /differ from what was signed last/ });
    const [row, ...others] = within(table).getAllByRole('row').slice(1);
    if (!row) throw new Error('The area should be among what changed.');
    expect(others).toEqual([]);
    expect(within(row).getByRole('rowheader').textContent).toContain('Coated area');
    const [was, now, change] = within(row).getAllByRole('cell');
    expect(was?.textContent).toContain('10.00');
    expect(now?.textContent).toContain('12.00');
    expect(change?.textContent).toBe('+20 %');
  });

  it('shows an entry that was rewritten even where no number moved', async () => {
    const before = chainWithArea({ evidence: 'Drawing 12, revision A' });
    keep(
      submissionWith({
        signedBefore: snapshotOf(before, [ids.areaRoute]),
        snapshot: snapshotOf(chainWithArea({ evidence: 'Drawing 12, revision B' }), [ids.hRoute, ids.areaRoute]),
      }),
    );
    open();

    expect(await screen.findByText('no number differs')).toBeDefined();
    const table = screen.getByRole('table', { name: 'Route "Stated value" of Coated area changed' });
    expect(within(table).getAllByRole('row')[1]?.textContent).toBe(
      'evidenceDrawing 12, revision ADrawing 12, revision B',
    );
  });

  it('names a number that was signed and is no longer in the package', async () => {
    const before = structuredClone(analogueChain);
    before.quantities.push({
      ...structuredClone(before.quantities[2] as (typeof before.quantities)[number]),
      id: '20000000-0000-4000-8000-00000000000f',
      name: 'Second area',
    });
    before.routes.push({
      ...structuredClone(before.routes[2] as (typeof before.routes)[number]),
      id: '30000000-0000-4000-8000-00000000000f',
      quantityId: '20000000-0000-4000-8000-00000000000f',
    });
    keep(submissionWith({ signedBefore: snapshotOf(before, [ids.areaRoute]) }));
    open();

    const table = await screen.findByRole('table', { name: /differ from what was signed last/ });
    expect(within(table).getByRole('row', { name: /Second area.*no value/ })).toBeDefined();
  });
});
