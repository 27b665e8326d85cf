import { createBrowserRouter, type RouteObject } from 'react-router-dom';
import { Loading } from '../ui/Loading.tsx';
import { AppLayout } from './AppLayout.tsx';
import { ErrorPage, NotFoundPage } from './ErrorPage.tsx';

/** Every page. Each is a chunk of its own, so that signing in loads neither the canvas nor the engine. */
export const routes: RouteObject[] = [
  {
    errorElement: <ErrorPage />,
    hydrateFallbackElement: <Loading what="Stemma" />,
    children: [
      { path: '/sign-in', lazy: () => import('../features/session/SignInPage.tsx') },
      { path: '/forgotten-password', lazy: () => import('../features/session/ForgottenPasswordPage.tsx') },
      { path: '/password/:token', lazy: () => import('../features/session/SetPasswordPage.tsx') },
      { path: '/setup/:token', lazy: () => import('../features/session/SetUpPage.tsx') },
      {
        element: <AppLayout />,
        children: [
          { index: true, lazy: () => import('../features/work-list/WorkListPage.tsx') },
          { path: '/studies', lazy: () => import('../features/studies/StudiesPage.tsx') },
          { path: '/studies/:studyId', lazy: () => import('../features/chain/ChainPage.tsx') },
          { path: '/studies/:studyId/members', lazy: () => import('../features/studies/MembersPage.tsx') },
          { path: '/studies/:studyId/log', lazy: () => import('../features/decision-log/DecisionLogPage.tsx') },
          { path: '/studies/:studyId/tests/new', lazy: () => import('../features/tests/NewTestPage.tsx') },
          { path: '/studies/:studyId/tests/:testId', lazy: () => import('../features/tests/TestPage.tsx') },
          { path: '/submissions/:submissionId', lazy: () => import('../features/submissions/SubmissionPage.tsx') },
          { path: '/people', lazy: () => import('../features/people/PeoplePage.tsx') },
          { path: '*', element: <NotFoundPage /> },
        ],
      },
    ],
  },
];

export const router = createBrowserRouter(routes);
