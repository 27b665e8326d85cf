import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useEffect, useLayoutEffect, useRef, useState } from 'react';
import {
  Navigate,
  NavLink,
  Outlet,
  ScrollRestoration,
  useLocation,
  useNavigate,
  useNavigationType,
} from 'react-router-dom';
import { signOut } from '../../shared/api/session.ts';
import { call, onSignedOut } from '../api/call.ts';
import { paths } from '../api/paths.ts';
import { ActorProvider, type SessionActor, sessionQuery, useSession } from '../api/session.ts';
import { Loading } from '../ui/Loading.tsx';
import { Mark } from '../ui/Mark.tsx';
import { ProblemNote } from '../ui/ProblemNote.tsx';
import { SetupNeeded } from './SetupNeeded.tsx';
import { ThemeChoice } from './ThemeChoice.tsx';

/** Everything behind sign-in: the bar on top and the page below; whoever is not signed in is sent there and back. */
export function AppLayout() {
  const session = useSession();
  const queryClient = useQueryClient();
  const location = useLocation();
  useEffect(() => {
    onSignedOut(() => void queryClient.invalidateQueries(sessionQuery));
    return () => onSignedOut(() => {});
  }, [queryClient]);

  if (session.data?.actor) {
    return (
      <ActorProvider value={session.data.actor}>
        <Shell actor={session.data.actor} />
      </ActorProvider>
    );
  }
  if (session.data?.needsSetup) return <SetupNeeded />;
  if (session.data) return <Navigate to={paths.signIn(location.pathname + location.search)} replace />;
  if (session.error) return <ProblemNote error={session.error} onRetry={() => void session.refetch()} />;
  return <Loading what="Stemma" />;
}

function Shell({ actor }: { readonly actor: SessionActor }) {
  const [isOpen, setOpen] = useState(false);
  const location = useLocation();
  useFreshPage(location.pathname, () => setOpen(false));
  const pages = [
    { to: paths.home(), words: 'Work list' },
    { to: paths.studies(), words: 'Studies' },
    ...(actor.isAdministrator ? [{ to: paths.people(), words: 'People' }] : []),
  ];
  return (
    <div className="grid min-h-dvh grid-rows-[auto_1fr]">
      <a href="#main" className="sr-only bg-surface p-2 focus:not-sr-only focus:absolute focus:z-50">
        Skip to the page
      </a>
      <header className="h-(--shell-height) border-b border-rule bg-surface print:hidden">
        <div className="flex h-full items-stretch">
          <NavLink to={paths.home()} className="grid w-14 place-items-center border-r border-rule" aria-label="Stemma">
            <Mark />
          </NavLink>
          <button
            type="button"
            className="px-4 font-semibold md:hidden"
            aria-expanded={isOpen}
            aria-controls="pages"
            onClick={() => setOpen(!isOpen)}
          >
            Menu
          </button>
          <nav
            id="pages"
            aria-label="Pages"
            className={`${isOpen ? 'absolute inset-x-0 top-(--shell-height) z-40 grid border-b border-rule bg-surface' : 'hidden'} md:static md:flex md:border-0`}
          >
            {pages.map((page) => (
              <NavLink
                key={page.to}
                to={page.to}
                end={page.to === paths.home()}
                className={({ isActive }) =>
                  `flex min-h-11 items-center border-b-4 px-4 font-semibold ${isActive ? 'border-ink' : 'border-transparent text-ink-2 hover:text-ink'}`
                }
              >
                {page.words}
              </NavLink>
            ))}
          </nav>
          <div className="ml-auto flex items-center gap-3 px-4 text-sm">
            <span className="text-ink-2 max-md:hidden">{actor.name}</span>
            <ThemeChoice />
            <SignOut />
          </div>
        </div>
      </header>
      <main id="main" tabIndex={-1} className="min-w-0 outline-none">
        <Outlet />
        <ScrollRestoration getKey={scrollKey} />
      </main>
    </div>
  );
}

/** Where a page was scrolled to is kept by its path: narrowing a list by its address moves nothing. */
const scrollKey = (location: { readonly pathname: string }) => location.pathname;

/**
 * A page that a link led to starts at its top, with the focus in it: a browser would do so, a router does not. Going
 * back is left to the router's `ScrollRestoration`, which knows where the page was.
 */
function useFreshPage(pathname: string, onArrival: () => void): void {
  const move = useNavigationType();
  const shown = useRef(pathname);
  useLayoutEffect(() => {
    if (shown.current === pathname) return;
    shown.current = pathname;
    onArrival();
    if (move === 'POP') return;
    window.scrollTo(0, 0);
    document.getElementById('main')?.focus({ preventScroll: true });
  }, [pathname, move, onArrival]);
}

function SignOut() {
  const queryClient = useQueryClient();
  const navigate = useNavigate();
  const leave = useMutation({
    mutationFn: () => call(signOut, {}),
    onSuccess: async () => {
      await navigate(paths.signIn());
      queryClient.clear();
    },
  });
  return (
    <>
      {leave.error && (
        <span role="alert" className="text-xs font-semibold text-bad">
          You are still signed in. {leave.error.message}
        </span>
      )}
      <button
        type="button"
        className="min-h-8 whitespace-nowrap underline"
        disabled={leave.isPending}
        onClick={() => leave.mutate()}
      >
        Sign out
      </button>
    </>
  );
}
