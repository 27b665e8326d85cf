import { cleanup, screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, describe, expect, it, vi } from 'vitest';
import type { WorkItem } from '../../shared/api/work-list.ts';
import { answerFetch, openApp, personWith, refuse, sessionOf } from './open-app.tsx';

afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

const base = { studyId: 's1', studyTitle: 'Wall-coated tube', since: '2026-03-04T09:12:00.000Z' };
const waits: WorkItem = {
  ...base,
  kind: 'submission waits for you',
  submissionId: 'p1',
  targetName: 'Time to dissolve',
  byName: 'Ines Roth',
  outsideWindows: 2,
};
const drafts: WorkItem = { ...base, kind: 'draft', draftCount: 3 };
const condition: WorkItem = {
  ...base,
  kind: 'condition',
  submissionId: 'p1',
  text: 'Repeat run 7 at the higher flow',
  dueOn: '2026-04-01',
};

describe('the work list', () => {
  it('groups what waits, the most pressing first, each leading to where it is done', async () => {
    answerFetch({
      'GET /api/session': sessionOf(personWith()),
      'GET /api/work-list': () => ({ items: [drafts, condition, waits] }),
    });
    openApp('/');

    const groups = await screen.findAllByRole('heading', { level: 2 });
    expect(groups.map((group) => group.textContent)).toEqual(['Waiting for your review', 'Conditions', 'Drafts']);
    const review = within(screen.getByRole('region', { name: 'Waiting for your review' })).getByRole('link');
    expect(review.getAttribute('href')).toBe('/submissions/p1');
    expect(review.textContent).toContain('Submitted by Ines Roth. 2 checks lie outside their windows.');
    expect(screen.getByRole('link', { name: /Finish 3 draft routes/ }).getAttribute('href')).toBe('/studies/s1');
    expect(screen.getByRole('link', { name: /Repeat run 7.*due on 2026-04-01/ })).toBeDefined();
  });

  it('says what will appear and where to go when nothing waits', async () => {
    answerFetch({ 'GET /api/session': sessionOf(personWith()), 'GET /api/work-list': () => ({ items: [] }) });
    openApp('/');

    expect(await screen.findByRole('heading', { name: 'Nothing waits for you' })).toBeDefined();
    expect(screen.getByRole('link', { name: 'Go to the studies' }).getAttribute('href')).toBe('/studies');
  });

  it('says why it cannot be shown and asks again on request', async () => {
    let isDown = true;
    answerFetch({
      'GET /api/session': sessionOf(personWith()),
      'GET /api/work-list': () =>
        isDown ? refuse({ code: 'unavailable', sentence: 'The database does not answer.' }) : { items: [drafts] },
    });
    openApp('/');

    expect((await screen.findByRole('alert')).textContent).toContain('The database does not answer.');
    isDown = false;
    await userEvent.click(screen.getByRole('button', { name: 'Try again' }));

    expect(await screen.findByRole('link', { name: /Finish 3 draft routes/ })).toBeDefined();
    expect(screen.queryByRole('alert')).toBeNull();
  });
});

describe('a link of the app', () => {
  it('leads to the top of the page, with the focus in it', async () => {
    answerFetch({
      'GET /api/session': sessionOf(personWith()),
      'GET /api/work-list': () => ({ items: [] }),
      'GET /api/studies': () => ({ studies: [] }),
    });
    const app = openApp('/');

    await userEvent.click(await screen.findByRole('link', { name: 'Go to the studies' }));
    await screen.findByRole('heading', { name: 'Studies' });

    expect(app.scrolledTo()).toEqual([0, 0]);
    expect(document.activeElement).toBe(screen.getByRole('main'));
  });
});

describe('the bar on top', () => {
  it.each([
    [true, ['Work list', 'Studies', 'People']],
    [false, ['Work list', 'Studies']],
  ])('offers the page People to administrators alone (administrator: %s)', async (isAdministrator, pages) => {
    answerFetch({
      'GET /api/session': sessionOf(personWith({ isAdministrator })),
      'GET /api/work-list': () => ({ items: [] }),
    });
    openApp('/');

    const nav = await screen.findByRole('navigation', { name: 'Pages', hidden: true });
    const links = within(nav).getAllByRole('link', { hidden: true });

    expect(links.map((link) => link.textContent)).toEqual(pages);
    expect(links[0]?.getAttribute('aria-current')).toBe('page');
  });

  it('says so when signing out did not succeed, since the session goes on', async () => {
    answerFetch({
      'GET /api/session': sessionOf(personWith()),
      'GET /api/work-list': () => ({ items: [drafts] }),
      'DELETE /api/session': () => refuse({ code: 'unavailable', sentence: 'The database does not answer.' }),
    });
    const app = openApp('/');

    await userEvent.click(await screen.findByRole('button', { name: 'Sign out' }));

    expect((await screen.findByRole('alert')).textContent).toMatch(/still signed in.*The database does not answer/);
    expect(app.address()).toBe('/');
  });
});
