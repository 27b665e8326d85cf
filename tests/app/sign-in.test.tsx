import { cleanup, screen, waitFor } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { answerFetch, openApp, personWith, refuse, sessionOf } from './open-app.tsx';

afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

const nobody = () => ({ actor: null, needsSetup: false });
const actor = personWith();

async function fillIn(password: string) {
  await userEvent.type(await screen.findByLabelText('Mail address'), actor.email);
  await userEvent.type(screen.getByLabelText('Password'), password);
  await userEvent.click(screen.getByRole('button', { name: 'Sign in' }));
}

describe('signing in', () => {
  it('leads to the page that was asked for, and back to it afterwards', async () => {
    const asked = answerFetch({
      'GET /api/session': nobody,
      'POST /api/session': () => ({ actor }),
      'GET /api/studies': () => ({ studies: [] }),
    });
    const app = openApp('/studies?state=approved');

    await fillIn('four words make a password');
    await screen.findByRole('heading', { name: 'Studies' });

    expect(app.address()).toBe('/studies?state=approved');
    expect(asked.find((one) => one.method === 'POST')?.body).toEqual({
      email: actor.email,
      password: 'four words make a password',
    });
  });

  it.each([['//elsewhere.test/studies'], ['https://elsewhere.test'], ['/\\elsewhere.test'], ['/..//elsewhere.test']])(
    'does not lead to another site after it: %s',
    async (to) => {
      answerFetch({ 'GET /api/session': sessionOf(actor), 'GET /api/work-list': () => ({ items: [] }) });
      const app = openApp(`/sign-in?to=${encodeURIComponent(to)}`);

      await screen.findByRole('heading', { name: 'Work list' });

      expect(app.address()).toBe('/');
    },
  );

  it('keeps what was typed when it is refused, says why, and moves the focus to the sentence', async () => {
    const sentence = 'Mail address and password do not fit together.';
    answerFetch({
      'GET /api/session': nobody,
      'POST /api/session': () => refuse({ code: 'not allowed', sentence }),
    });
    openApp('/sign-in');

    await fillIn('not the right password');
    const note = await screen.findByRole('alert');

    expect(note.textContent).toContain(sentence);
    await waitFor(() => expect(document.activeElement).toBe(note));
    expect((screen.getByLabelText('Mail address') as HTMLInputElement).value).toBe(actor.email);
    expect((screen.getByLabelText('Password') as HTMLInputElement).value).toBe('not the right password');
    expect(document.title).toBe('Error: Sign in · Stemma');
  });

  it('carries the caution that an estimate replaces neither tests nor codes nor licensed practice', async () => {
    answerFetch({ 'GET /api/session': nobody });
    openApp('/sign-in');

    expect(
      await screen.findByText(/They replace neither tests nor the local codes nor licensed practice/),
    ).toBeDefined();
  });

  it('is asked for again when the session ended, with the way back to the page', async () => {
    let actorNow: typeof actor | null = actor;
    answerFetch({
      'GET /api/session': () => ({ actor: actorNow, needsSetup: false }),
      'GET /api/studies': () => {
        actorNow = null;
        return refuse({ code: 'signed out', sentence: 'Sign in to go on.' });
      },
    });
    const app = openApp('/studies');

    await screen.findByRole('heading', { name: 'Sign in' });

    expect(app.address()).toBe('/sign-in?to=%2Fstudies');
  });
});

describe('choosing a password', () => {
  it('shows what the server said of the field beside it and keeps the form', async () => {
    answerFetch({
      'POST /api/passwords': () =>
        refuse({
          code: 'invalid',
          sentence: 'The password cannot be used.',
          fields: { 'body.password': 'Use at least 15 characters.' },
        }),
    });
    openApp('/password/one-time-token');

    await userEvent.type(await screen.findByLabelText('New password'), 'short');
    await userEvent.click(screen.getByRole('button', { name: 'Set the password' }));

    const field = await screen.findByLabelText('New password');
    await waitFor(() => expect(field.getAttribute('aria-invalid')).toBe('true'));
    const described = (field.getAttribute('aria-describedby') ?? '').split(' ');
    expect(described.map((id) => document.getElementById(id)?.textContent)).toContain('Use at least 15 characters.');
    expect((field as HTMLInputElement).value).toBe('short');
  });

  it('sends the token of the link and leads to signing in', async () => {
    const asked = answerFetch({ 'POST /api/passwords': () => ({ email: actor.email }) });
    openApp('/password/one-time-token');

    await userEvent.type(await screen.findByLabelText('New password'), 'four words make a password');
    await userEvent.click(screen.getByRole('button', { name: 'Set the password' }));

    const link = await screen.findByRole('link', { name: `Sign in as ${actor.email}` });
    expect(link.getAttribute('href')).toBe('/sign-in');
    expect(asked.at(-1)?.body).toEqual({ token: 'one-time-token', password: 'four words make a password' });
  });
});
