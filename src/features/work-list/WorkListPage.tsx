import { queryOptions, useQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import { getWorkList, type WorkItem } from '../../../shared/api/work-list.ts';
import { call } from '../../api/call.ts';
import { paths } from '../../api/paths.ts';
import { useActor } from '../../api/session.ts';
import { EmptyState } from '../../ui/EmptyState.tsx';
import { Loading } from '../../ui/Loading.tsx';
import { Moment } from '../../ui/Moment.tsx';
import { Page } from '../../ui/Page.tsx';
import { ProblemNote } from '../../ui/ProblemNote.tsx';
import { describeWork, groupsOfWork } from './describe-work.ts';

const workListQuery = queryOptions({
  queryKey: ['work-list'],
  queryFn: ({ signal }) => call(getWorkList, {}, signal),
});

/** What must I do now, and why. */
export function Component() {
  const actor = useActor();
  const work = useQuery(workListQuery);
  return (
    <Page title="Work list">
      {work.error && <ProblemNote error={work.error} onRetry={() => void work.refetch()} />}
      {work.isPending && <Loading what="your work list" />}
      {work.data &&
        (work.data.items.length > 0 ? (
          groupsOfWork(work.data.items).map((group) => (
            <Group key={group.title} title={group.title} items={group.items} />
          ))
        ) : (
          <EmptyState title="Nothing waits for you">
            <p>
              Submissions to review, work returned to you, open drafts and conditions appear here.{' '}
              {actor.isAdministrator && 'As administrator you invite people on the page People.'}
            </p>
            <Link to={paths.studies()} className="font-semibold text-primary underline">
              Go to the studies
            </Link>
          </EmptyState>
        ))}
    </Page>
  );
}

function Group({ title, items }: { readonly title: string; readonly items: readonly WorkItem[] }) {
  return (
    <section aria-label={title} className="grid gap-1">
      <div className="flex items-baseline justify-between border-b border-rule pb-1">
        <h2 className="text-lg font-bold">{title}</h2>
        <span className="text-sm text-ink-2">{items.length}</span>
      </div>
      <ul>
        {items.map((item, index) => {
          const { what, why, path } = describeWork(item);
          return (
            // biome-ignore lint/suspicious/noArrayIndexKey: two items of one study may read the same.
            <li key={`${item.kind} ${item.studyId} ${index}`} className="border-b border-hair bg-surface">
              <Link to={path} className="grid gap-0.5 px-3 py-2 hover:bg-sunk md:grid-cols-[1fr_auto] md:gap-4">
                <span className="min-w-0">
                  <span className="font-semibold underline">{what}</span>
                  <span className="block text-sm text-ink-2">{why}</span>
                </span>
                <span className="text-xs text-ink-2 md:text-right">
                  <span className="block">{item.studyTitle}</span>
                  <Moment at={item.since} />
                </span>
              </Link>
            </li>
          );
        })}
      </ul>
    </section>
  );
}
