import { queryOptions, useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { changePerson, invitePerson, listPeople, type Person } from '../../../shared/api/people.ts';
import { call } from '../../api/call.ts';
import { useActor } from '../../api/session.ts';
import { Button } from '../../ui/Button.tsx';
import { Dialog } from '../../ui/Dialog.tsx';
import { Field } from '../../ui/Field.tsx';
import { FormProblem } from '../../ui/FormProblem.tsx';
import { Loading } from '../../ui/Loading.tsx';
import { Page } from '../../ui/Page.tsx';
import { ProblemNote } from '../../ui/ProblemNote.tsx';
import { useFormProblem } from '../../ui/use-form-problem.ts';

const peopleQuery = queryOptions({ queryKey: ['people'], queryFn: ({ signal }) => call(listPeople, {}, signal) });

function rolesOf(person: Person): string {
  const roles = [person.isAdministrator ? 'administrator' : '', person.isAuditor ? 'auditor of every study' : ''];
  return roles.filter(Boolean).join(', ') || 'roles per study';
}

/** The administrator's page: who has an account, and with which rights over the installation. */
export function Component() {
  const actor = useActor();
  const people = useQuery(peopleQuery);
  const [dialog, setDialog] = useState<Person | 'invite' | null>(null);
  return (
    <Page
      title="People"
      actions={actor.isAdministrator && <Button onClick={() => setDialog('invite')}>Invite a person</Button>}
    >
      {people.error && <ProblemNote error={people.error} onRetry={() => void people.refetch()} />}
      {people.isPending && <Loading what="the people" />}
      {people.data && (
        <ul className="border border-rule bg-surface">
          {people.data.people.map((person) => (
            <li
              key={person.id}
              className="flex flex-wrap items-center justify-between gap-3 border-b border-hair px-3 py-2 last:border-b-0"
            >
              <span className="min-w-0">
                <strong className={person.isActive ? '' : 'line-through'}>{person.name}</strong>{' '}
                <span className="text-ink-2">{person.email}</span>
                <span className="block text-sm text-ink-2">
                  {rolesOf(person)}
                  {!person.hasPassword && '; invited, has not chosen a password yet'}
                  {!person.isActive && '; deactivated'}
                </span>
              </span>
              {actor.isAdministrator && (
                <Button variant="plain" onClick={() => setDialog(person)} aria-label={`Change ${person.name}`}>
                  Change
                </Button>
              )}
            </li>
          ))}
        </ul>
      )}
      {dialog === 'invite' && <InviteDialog onClose={() => setDialog(null)} />}
      {dialog && dialog !== 'invite' && <ChangeDialog person={dialog} onClose={() => setDialog(null)} />}
    </Page>
  );
}

function Rights({ person }: { readonly person?: Person }) {
  return (
    <fieldset className="grid gap-1 text-sm">
      <legend className="font-semibold">Rights over the installation</legend>
      <label className="flex min-h-8 items-center gap-2">
        <input type="checkbox" name="isAdministrator" defaultChecked={person?.isAdministrator} />
        Administrator: invites people, reads no study unless a member
      </label>
      <label className="flex min-h-8 items-center gap-2">
        <input type="checkbox" name="isAuditor" defaultChecked={person?.isAuditor} />
        Auditor of every study: reads and verifies, changes nothing
      </label>
      {person && (
        <label className="flex min-h-8 items-center gap-2">
          <input type="checkbox" name="isActive" defaultChecked={person.isActive} />
          Active: may sign in
        </label>
      )}
    </fieldset>
  );
}

function InviteDialog({ onClose }: { readonly onClose: () => void }) {
  const queryClient = useQueryClient();
  const invite = useMutation({
    mutationFn: (body: { name: string; email: string; isAdministrator: boolean; isAuditor: boolean }) =>
      call(invitePerson, { body }),
    onSuccess: async () => {
      await queryClient.invalidateQueries(peopleQuery);
      onClose();
    },
  });
  const problem = useFormProblem(invite.error);
  return (
    <Dialog open title="Invite a person" onClose={onClose}>
      <form
        className="grid gap-4"
        onSubmit={(event) => {
          event.preventDefault();
          const form = new FormData(event.currentTarget);
          invite.mutate({
            name: String(form.get('name')),
            email: String(form.get('email')),
            isAdministrator: form.has('isAdministrator'),
            isAuditor: form.has('isAuditor'),
          });
        }}
      >
        <FormProblem error={invite.error} noteRef={problem.note} />
        <Field label="Name" hint="As it shall be printed in the record." error={problem.fieldError('name')}>
          {(parts) => <input {...parts} name="name" required maxLength={120} className="input" />}
        </Field>
        <Field label="Mail address" error={problem.fieldError('email')}>
          {(parts) => <input {...parts} name="email" type="email" required className="input" />}
        </Field>
        <Rights />
        <p className="text-sm text-ink-2">A mail with a link to choose a password goes out at once.</p>
        <Button type="submit" disabled={invite.isPending}>
          Send the invitation
        </Button>
      </form>
    </Dialog>
  );
}

function ChangeDialog({ person, onClose }: { readonly person: Person; readonly onClose: () => void }) {
  const queryClient = useQueryClient();
  const change = useMutation({
    mutationFn: (body: { name: string; isAdministrator: boolean; isAuditor: boolean; isActive: boolean }) =>
      call(changePerson, { params: { personId: person.id }, body }),
    onSuccess: async () => {
      await queryClient.invalidateQueries(peopleQuery);
      onClose();
    },
  });
  const problem = useFormProblem(change.error);
  return (
    <Dialog open title={`Change ${person.name}`} onClose={onClose}>
      <form
        className="grid gap-4"
        onSubmit={(event) => {
          event.preventDefault();
          const form = new FormData(event.currentTarget);
          change.mutate({
            name: String(form.get('name')),
            isAdministrator: form.has('isAdministrator'),
            isAuditor: form.has('isAuditor'),
            isActive: form.has('isActive'),
          });
        }}
      >
        <FormProblem error={change.error} noteRef={problem.note} />
        <Field label="Name" hint="What was signed keeps the name as it was then." error={problem.fieldError('name')}>
          {(parts) => (
            <input {...parts} name="name" defaultValue={person.name} required maxLength={120} className="input" />
          )}
        </Field>
        <Rights person={person} />
        <Button type="submit" disabled={change.isPending}>
          Save
        </Button>
      </form>
    </Dialog>
  );
}
