import { queryOptions, useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useParams } from 'react-router-dom';
import { listPeople } from '../../../shared/api/people.ts';
import { addMember, getStudy, removeMember } from '../../../shared/api/studies.ts';
import { roleNames, type StudyRole, studyRoles } from '../../../shared/domain/ability.ts';
import { canManageMembers } from '../../../shared/domain/study-policy.ts';
import { call } from '../../api/call.ts';
import { useAsking } from '../../api/use-asking.ts';
import { ActionButton } from '../../ui/ActionButton.tsx';
import { Button } from '../../ui/Button.tsx';
import { Field } from '../../ui/Field.tsx';
import { Loading } from '../../ui/Loading.tsx';
import { Page } from '../../ui/Page.tsx';
import { ProblemNote } from '../../ui/ProblemNote.tsx';
import { StudyHeader } from '../../ui/StudyHeader.tsx';

const membersQuery = (studyId: string) =>
  queryOptions({
    queryKey: ['members', studyId],
    queryFn: ({ signal }) => call(getStudy, { params: { studyId } }, signal),
    select: ({ title, members }) => ({ title, members }),
  });
const peopleQuery = queryOptions({ queryKey: ['people'], queryFn: ({ signal }) => call(listPeople, {}, signal) });

const may: Record<StudyRole, string> = {
  engineer: 'builds and edits the chain, submits it, chooses the members',
  manager: 'rules on assumptions, signs or returns submissions, does not edit',
  auditor: 'reads everything and verifies the decision log',
};

/** Who takes part in a study, and in which role. */
export function Component() {
  const { studyId = '' } = useParams();
  const asking = useAsking();
  const queryClient = useQueryClient();
  const study = useQuery(membersQuery(studyId));
  const people = useQuery(peopleQuery);
  const refresh = () => queryClient.invalidateQueries(membersQuery(studyId));
  const add = useMutation({
    mutationFn: (body: { personId: string; role: StudyRole }) => call(addMember, { params: { studyId }, body }),
    onSuccess: refresh,
  });
  const remove = useMutation({
    mutationFn: (personId: string) => call(removeMember, { params: { studyId, personId } }),
    onSuccess: refresh,
  });
  const decision = canManageMembers(asking, studyId);
  const members = study.data?.members ?? [];
  const others = (people.data?.people ?? []).filter(
    (person) => person.isActive && !members.some((member) => member.personId === person.id),
  );
  return (
    <Page title={study.data ? `Members of ${study.data.title}` : 'Members'}>
      <StudyHeader studyId={studyId} current="members" />
      {study.error && <ProblemNote error={study.error} onRetry={() => void study.refetch()} />}
      {study.isPending && <Loading what="the members" />}
      {study.data && (
        <>
          <ul className="border border-rule bg-surface">
            {members.map((member) => (
              <li
                key={member.personId}
                className="flex flex-wrap items-center justify-between gap-3 border-b border-hair px-3 py-2 last:border-b-0"
              >
                <span>
                  <strong>{member.name}</strong>, {roleNames[member.role]}
                  <span className="block text-sm text-ink-2">{may[member.role]}</span>
                </span>
                {decision.allowed && (
                  <Button
                    variant="plain"
                    disabled={remove.isPending}
                    onClick={() => remove.mutate(member.personId)}
                    aria-label={`Remove ${member.name}`}
                  >
                    Remove
                  </Button>
                )}
              </li>
            ))}
          </ul>
          {remove.error && <ProblemNote error={remove.error} />}
          <form
            aria-label="Add a member"
            className="flex flex-wrap items-end gap-3"
            onSubmit={(event) => {
              event.preventDefault();
              const form = new FormData(event.currentTarget);
              const role = studyRoles.find((one) => one === form.get('role'));
              if (role) add.mutate({ personId: String(form.get('personId')), role });
            }}
          >
            <Field label="Person">
              {(parts) => (
                <select {...parts} name="personId" required className="input">
                  {others.map((person) => (
                    <option key={person.id} value={person.id}>
                      {person.name} ({person.email})
                    </option>
                  ))}
                </select>
              )}
            </Field>
            <Field label="Role">
              {(parts) => (
                <select {...parts} name="role" className="input" defaultValue="manager">
                  {studyRoles.map((role) => (
                    <option key={role} value={role}>
                      {roleNames[role]}
                    </option>
                  ))}
                </select>
              )}
            </Field>
            <ActionButton type="submit" decision={decision} busy={add.isPending || others.length === 0}>
              Add the member
            </ActionButton>
          </form>
          {others.length === 0 && people.data && (
            <p className="text-sm text-ink-2">
              Everybody with an account is a member. An administrator invites more people.
            </p>
          )}
          {add.error && <ProblemNote error={add.error} />}
        </>
      )}
    </Page>
  );
}
