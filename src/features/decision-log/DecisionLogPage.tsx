import { useInfiniteQuery, useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useParams, useSearchParams } from 'react-router-dom';
import { type LogEntry, listLogEntries, verifyLog } from '../../../shared/api/decision-log.ts';
import { canVerify } from '../../../shared/domain/study-policy.ts';
import { call } from '../../api/call.ts';
import { studiesQuery } from '../../api/studies-query.ts';
import { useAsking } from '../../api/use-asking.ts';
import { ActionButton } from '../../ui/ActionButton.tsx';
import { BeforeAfter } from '../../ui/BeforeAfter.tsx';
import { Button } from '../../ui/Button.tsx';
import { Field } from '../../ui/Field.tsx';
import { Loading } from '../../ui/Loading.tsx';
import { Moment } from '../../ui/Moment.tsx';
import { Page } from '../../ui/Page.tsx';
import { ProblemNote } from '../../ui/ProblemNote.tsx';
import { StudyHeader } from '../../ui/StudyHeader.tsx';
import { beforeAndAfter } from './before-after.ts';
import { entrySentence, studyEventNames } from './entry-sentence.ts';

/** Everything that happened to a study, newest first, and the proof that nothing was changed since. */
export function Component() {
  const { studyId = '' } = useParams();
  const studies = useQuery(studiesQuery);
  const study = studies.data?.studies.find((one) => one.id === studyId);
  const [search, setSearch] = useSearchParams();
  const event = search.get('event') ?? '';
  const text = search.get('text') ?? '';
  const log = useInfiniteQuery({
    queryKey: ['decision-log', studyId, event, text],
    initialPageParam: undefined as number | undefined,
    queryFn: ({ pageParam, signal }) =>
      call(
        listLogEntries,
        {
          params: { studyId },
          query: { before: pageParam, event: event || undefined, text: text || undefined, actorId: undefined },
        },
        signal,
      ),
    getNextPageParam: (page) => (page.hasMore ? page.entries.at(-1)?.seq : undefined),
    placeholderData: (before) => before,
  });
  const narrow = (name: string, value: string) =>
    setSearch(
      (before) => {
        if (value === '') before.delete(name);
        else before.set(name, value);
        return before;
      },
      { replace: true },
    );
  const entries = log.data?.pages.flatMap((page) => page.entries) ?? [];
  const total = log.data?.pages[0]?.total ?? 0;
  return (
    <Page title={study ? `Decision log of ${study.title}` : 'Decision log'}>
      <StudyHeader studyId={studyId} current="log" />
      <Verification studyId={studyId} />
      <div className="flex flex-wrap items-end gap-3">
        <div className="w-56 max-w-full">
          <Field label="What happened">
            {(parts) => (
              <select
                {...parts}
                value={event}
                onChange={(change) => narrow('event', change.target.value)}
                className="input"
              >
                <option value="">Everything</option>
                {Object.entries(studyEventNames).map(([value, words]) => (
                  <option key={value} value={value}>
                    {words}
                  </option>
                ))}
              </select>
            )}
          </Field>
        </div>
        <div className="w-64 max-w-full">
          <Field label="Text in it">
            {(parts) => (
              <input
                {...parts}
                type="search"
                value={text}
                onChange={(change) => narrow('text', change.target.value)}
                className="input"
              />
            )}
          </Field>
        </div>
        <p role="status" className="pb-2 text-sm text-ink-2">
          {total} {total === 1 ? 'entry' : 'entries'}
        </p>
      </div>
      {log.error && <ProblemNote error={log.error} onRetry={() => void log.refetch()} />}
      {log.isPending && <Loading what="the decision log" />}
      {log.data && entries.length === 0 && <p>No entry fits. Choose "Everything" and empty the text to see all.</p>}
      <ol className="grid border-t border-rule">
        {entries.map((entry) => (
          <Entry key={entry.seq} entry={entry} />
        ))}
      </ol>
      {log.hasNextPage && (
        <Button variant="plain" disabled={log.isFetchingNextPage} onClick={() => void log.fetchNextPage()}>
          Show older entries
        </Button>
      )}
    </Page>
  );
}

function Entry({ entry }: { readonly entry: LogEntry }) {
  const [isOpen, setOpen] = useState(false);
  const items = beforeAndAfter(entry.event);
  return (
    <li className="grid gap-x-4 gap-y-1 border-b border-hair bg-surface px-3 py-2 md:grid-cols-[4rem_1fr_auto]">
      <span className="num text-ink-2">{entry.seq}</span>
      <div className="min-w-0">
        <p className="break-words">
          <strong>{entry.actorName}</strong> {entrySentence(entry.event)}
        </p>
        {items.length > 0 && (
          <details open={isOpen} onToggle={(event) => setOpen(event.currentTarget.open)}>
            <summary className="min-h-7 cursor-pointer text-sm text-primary underline">Before and after</summary>
            {isOpen && items.map((item) => <BeforeAfter key={item.key} item={item} />)}
          </details>
        )}
      </div>
      <div className="text-xs text-ink-2 md:text-right">
        <Moment at={entry.at} />
        <span className="num block" title={entry.hash}>
          {entry.hash.slice(0, 12)}
        </span>
      </div>
    </li>
  );
}

function Verification({ studyId }: { readonly studyId: string }) {
  const asking = useAsking();
  const queryClient = useQueryClient();
  const verify = useMutation({
    mutationFn: () => call(verifyLog, { params: { studyId } }),
    onSuccess: () => queryClient.invalidateQueries({ queryKey: ['decision-log', studyId] }),
  });
  return (
    <section aria-label="Verification" className="grid gap-2 border border-rule bg-surface p-3">
      <div className="flex flex-wrap items-center justify-between gap-3">
        <p className="max-w-[70ch] text-sm text-ink-2">
          Each entry carries the hash of the one before. Verifying recomputes them all, and is itself recorded as a
          review of the log.
        </p>
        <ActionButton decision={canVerify(asking, studyId)} busy={verify.isPending} onClick={() => verify.mutate()}>
          Verify the log
        </ActionButton>
      </div>
      <div role="status">
        {verify.data?.broken && (
          <p className="font-semibold text-bad">
            Broken at entry {verify.data.broken.seq}: {verify.data.broken.sentence}
          </p>
        )}
        {verify.data?.whole && (
          <p className="font-semibold text-ok">
            Whole: {verify.data.entries} entries, last hash{' '}
            <span className="num">{verify.data.headHash.slice(0, 16)}</span>
          </p>
        )}
      </div>
      {verify.error && <ProblemNote error={verify.error} />}
    </section>
  );
}
