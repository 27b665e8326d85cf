import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { configure, render } from '@testing-library/react';
import { createMemoryRouter, RouterProvider } from 'react-router-dom';
import { vi } from 'vitest';
import type { ProblemBody } from '../../shared/api/problem.ts';
import { problemStatus } from '../../shared/api/problem.ts';
import type { SessionActor } from '../../src/api/session.ts';
import { routes } from '../../src/app/router.tsx';

// The first page of a file loads its chunk, the engine among them: on a busy machine more than the usual second.
configure({ asyncUtilTimeout: 10_000 });

export type Asked = { readonly method: string; readonly path: string; readonly body: unknown };
export type Answer = (asked: Asked) => unknown;

/** An answer that refuses: its status follows from the code. */
class Refusal {
  readonly problem: ProblemBody;

  constructor(problem: ProblemBody) {
    this.problem = problem;
  }
}
export function refuse(problem: ProblemBody): Refusal {
  return new Refusal(problem);
}

/**
 * Answers what the client fetches, by method and path as in `POST /api/session`. What the test gave no answer for
 * fails loudly. Returns everything that was asked, in order.
 */
export function answerFetch(answers: Readonly<Record<string, Answer>>): Asked[] {
  const everything: Asked[] = [];
  vi.stubGlobal('fetch', async (address: string, init: RequestInit = {}) => {
    const path = address.split('?')[0] ?? address;
    const asked: Asked = {
      method: init.method ?? 'GET',
      path: address,
      body: typeof init.body === 'string' ? JSON.parse(init.body) : undefined,
    };
    everything.push(asked);
    const answer = answers[`${asked.method} ${path}`];
    if (!answer) throw new Error(`The test has no answer to ${asked.method} ${path}.`);
    const given = await answer(asked);
    if (given instanceof Refusal) return Response.json(given.problem, { status: problemStatus[given.problem.code] });
    return Response.json(given);
  });
  return everything;
}

/** The whole client at an address, with the pages and the router of the product and a cache of its own. */
export function openApp(address: string) {
  let place: unknown[] = [];
  // jsdom lays nothing out and therefore scrolls nowhere.
  vi.stubGlobal('scrollTo', (...to: unknown[]) => {
    place = to;
  });
  const router = createMemoryRouter(routes, { initialEntries: [address] });
  const client = new QueryClient({ defaultOptions: { queries: { retry: false } } });
  render(
    <QueryClientProvider client={client}>
      <RouterProvider router={router} />
    </QueryClientProvider>,
  );
  return {
    /** Where the person is now. */
    address: () => router.state.location.pathname + router.state.location.search,
    /** Where the window was last told to scroll to. */
    scrolledTo: () => place,
  };
}

export function personWith(change: Partial<SessionActor> = {}): SessionActor {
  return {
    personId: '50000000-0000-4000-8000-000000000001',
    name: 'Ines Roth',
    email: 'ines.roth@example.test',
    isAdministrator: false,
    isAuditor: false,
    memberships: {},
    ...change,
  };
}

/** The session of somebody who is signed in. */
export const sessionOf = (actor: SessionActor): Answer => {
  return () => ({ actor, needsSetup: false });
};
