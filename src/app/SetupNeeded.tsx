import { Page } from '../ui/Page.tsx';

export function SetupNeeded() {
  return (
    <main>
      <Page title="Stemma is not set up yet" narrow>
        <p>
          The server printed a one-time link when it started. Open it to make the first administrator; it works once,
          within a day. If it is lost, start the server again: it prints a new one.
        </p>
      </Page>
    </main>
  );
}
