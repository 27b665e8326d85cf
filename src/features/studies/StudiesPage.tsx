import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { Link, useNavigate, useSearchParams } from 'react-router-dom';
import { createStudy, type StudySummary } from '../../../shared/api/studies.ts';
import { roleNames } from '../../../shared/domain/ability.ts';
import { canCreateStudy } from '../../../shared/domain/study-policy.ts';
import { call } from '../../api/call.ts';
import { paths } from '../../api/paths.ts';
import { sessionQuery } from '../../api/session.ts';
import { studiesQuery } from '../../api/studies-query.ts';
import { useAsking } from '../../api/use-asking.ts';
import { ActionButton } from '../../ui/ActionButton.tsx';
import { Button } from '../../ui/Button.tsx';
import { Dialog } from '../../ui/Dialog.tsx';
import { EmptyState } from '../../ui/EmptyState.tsx';
import { Field } from '../../ui/Field.tsx';
import { FormProblem } from '../../ui/FormProblem.tsx';
import { Loading } from '../../ui/Loading.tsx';
import { Moment } from '../../ui/Moment.tsx';
import { Page } from '../../ui/Page.tsx';
import { ProblemNote } from '../../ui/ProblemNote.tsx';
import { useFormProblem } from '../../ui/use-form-problem.ts';

const states = {
  all: 'All',
  review: 'With something in review',
  open: 'Not all approved',
  approved: 'All approved',
} as const;
type StateFilter = keyof typeof states;

function fits(study: StudySummary, text: string, state: StateFilter): boolean {
  const words = `${study.title} ${study.question}`.toLowerCase();
  if (!words.includes(text.trim().toLowerCase())) return false;
  switch (state) {
    case 'all':
      return true;
    case 'review':
      return study.inReviewCount > 0;
    case 'open':
      return study.quantityCount === 0 || study.approvedCount < study.quantityCount;
    case 'approved':
      return study.quantityCount > 0 && study.approvedCount === study.quantityCount;
  }
}

export function Component() {
  const asking = useAsking();
  const studies = useQuery(studiesQuery);
  const [search, setSearch] = useSearchParams();
  const [isCreating, setCreating] = useState(false);
  const text = search.get('text') ?? '';
  const wanted = search.get('state') ?? 'all';
  const state = (wanted in states ? wanted : 'all') as StateFilter;
  const narrow = (name: string, value: string) =>
    setSearch(
      (before) => {
        if (value === '' || value === 'all') before.delete(name);
        else before.set(name, value);
        return before;
      },
      { replace: true },
    );
  const all = studies.data?.studies ?? [];
  const shown = all.filter((study) => fits(study, text, state));

  return (
    <Page
      title="Studies"
      actions={
        <ActionButton decision={canCreateStudy(asking)} onClick={() => setCreating(true)}>
          New study
        </ActionButton>
      }
    >
      {studies.error && <ProblemNote error={studies.error} onRetry={() => void studies.refetch()} />}
      {studies.isPending && <Loading what="the studies" />}
      {studies.data && all.length === 0 && (
        <EmptyState title="No studies yet">
          <p>A study answers one scale-up question. Those that you are a member of appear here.</p>
        </EmptyState>
      )}
      {all.length > 0 && (
        <>
          <div className="flex flex-wrap items-end gap-3">
            <div className="w-64 max-w-full">
              <Field label="Search">
                {(parts) => (
                  <input
                    {...parts}
                    type="search"
                    value={text}
                    onChange={(event) => narrow('text', event.target.value)}
                    className="input"
                  />
                )}
              </Field>
            </div>
            <div className="w-56 max-w-full">
              <Field label="State">
                {(parts) => (
                  <select
                    {...parts}
                    value={state}
                    onChange={(event) => narrow('state', event.target.value)}
                    className="input"
                  >
                    {Object.entries(states).map(([value, words]) => (
                      <option key={value} value={value}>
                        {words}
                      </option>
                    ))}
                  </select>
                )}
              </Field>
            </div>
            <p role="status" className="pb-2 text-sm text-ink-2">
              {shown.length} of {all.length} {all.length === 1 ? 'study' : 'studies'}
            </p>
          </div>
          <StudyTable studies={shown} />
        </>
      )}
      {isCreating && <NewStudyDialog onClose={() => setCreating(false)} />}
    </Page>
  );
}

function StudyTable({ studies }: { readonly studies: readonly StudySummary[] }) {
  return (
    <ul className="grid border border-rule bg-surface">
      {studies.map((study) => (
        <li
          key={study.id}
          className="grid gap-x-6 gap-y-1 border-b border-hair px-3 py-2.5 last:border-b-0 md:grid-cols-[1fr_9rem_21rem]"
        >
          <div className="min-w-0">
            <Link to={paths.study(study.id)} className="font-bold text-primary underline">
              {study.title}
            </Link>
            <p className="text-sm text-ink-2">{study.question}</p>
          </div>
          <p className="text-sm">
            {study.approvedCount} of {study.quantityCount} approved
            {study.inReviewCount > 0 && <span className="block text-info">{study.inReviewCount} in review</span>}
          </p>
          <p className="text-xs text-ink-2">
            <span className="block">
              {study.myRole ? `You are its ${roleNames[study.myRole]}` : 'You read it as auditor'}
            </span>
            Changed <Moment at={study.changedAt} />
          </p>
        </li>
      ))}
    </ul>
  );
}

function NewStudyDialog({ onClose }: { readonly onClose: () => void }) {
  const navigate = useNavigate();
  const queryClient = useQueryClient();
  const create = useMutation({
    mutationFn: (body: { title: string; question: string }) => call(createStudy, { body }),
    onSuccess: async (study) => {
      // The session carries the roles; the new one must be known before the study opens.
      await queryClient.invalidateQueries(sessionQuery);
      await queryClient.invalidateQueries(studiesQuery);
      await navigate(paths.study(study.id));
    },
  });
  const problem = useFormProblem(create.error);
  return (
    <Dialog open title="New study" onClose={onClose}>
      <form
        className="grid gap-4"
        onSubmit={(event) => {
          event.preventDefault();
          const form = new FormData(event.currentTarget);
          create.mutate({ title: String(form.get('title')), question: String(form.get('question')) });
        }}
      >
        <FormProblem error={create.error} noteRef={problem.note} />
        <Field label="Title" error={problem.fieldError('title')}>
          {(parts) => <input {...parts} name="title" required maxLength={200} className="input" />}
        </Field>
        <Field
          label="Question"
          hint="Which number does the plant need, and what for?"
          error={problem.fieldError('question')}
        >
          {(parts) => <textarea {...parts} name="question" rows={3} maxLength={4000} className="input" />}
        </Field>
        <div className="flex gap-2">
          <Button type="submit" disabled={create.isPending}>
            Create the study
          </Button>
          <Button variant="plain" onClick={onClose}>
            Cancel
          </Button>
        </div>
      </form>
    </Dialog>
  );
}
