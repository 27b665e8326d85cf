import { isRouteErrorResponse, Link, useRouteError } from 'react-router-dom';
import { paths } from '../api/paths.ts';
import { Page } from '../ui/Page.tsx';

/** The last net under every page: a sentence and a way on. */
export function ErrorPage() {
  const error = useRouteError();
  const isMissing = isRouteErrorResponse(error) && error.status === 404;
  return (
    <main>
      <Page title={isMissing ? 'There is no such page' : 'This page could not be shown'} narrow>
        <p>
          {isMissing
            ? 'The address leads nowhere. It may have been mistyped, or what it named was removed.'
            : 'Something went wrong while it was put together. Reload it; what was saved is safe on the server.'}
        </p>
        <p>
          <Link to={paths.home()} className="font-semibold text-primary underline">
            Go to the work list
          </Link>
        </p>
      </Page>
    </main>
  );
}

export function NotFoundPage() {
  return (
    <Page title="There is no such page" narrow>
      <p>The address leads nowhere. It may have been mistyped, or what it named was removed.</p>
      <p>
        <Link to={paths.home()} className="font-semibold text-primary underline">
          Go to the work list
        </Link>
      </p>
    </Page>
  );
}
