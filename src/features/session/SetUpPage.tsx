import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useNavigate, useParams } from 'react-router-dom';
import { setUpAdministrator } from '../../../shared/api/session.ts';
import { call } from '../../api/call.ts';
import { paths } from '../../api/paths.ts';
import { sessionQuery } from '../../api/session.ts';
import { Button } from '../../ui/Button.tsx';
import { Field } from '../../ui/Field.tsx';
import { FormProblem } from '../../ui/FormProblem.tsx';
import { useFormProblem } from '../../ui/use-form-problem.ts';
import { SessionFrame } from './SessionFrame.tsx';

export function Component() {
  const { token = '' } = useParams();
  const navigate = useNavigate();
  const queryClient = useQueryClient();
  const setUp = useMutation({
    mutationFn: (body: { name: string; email: string; password: string }) =>
      call(setUpAdministrator, { body: { token, ...body } }),
    onSuccess: async ({ actor }) => {
      queryClient.setQueryData(sessionQuery.queryKey, { actor, needsSetup: false });
      await navigate(paths.people());
    },
  });
  const problem = useFormProblem(setUp.error);
  return (
    <SessionFrame title="Set up the first administrator" problem={setUp.isError}>
      <p className="text-sm">
        The administrator invites people and gives them their roles, reads no study unless made a member, and signs
        nothing.
      </p>
      <form
        className="grid gap-4"
        onSubmit={(event) => {
          event.preventDefault();
          const form = new FormData(event.currentTarget);
          setUp.mutate({
            name: String(form.get('name')),
            email: String(form.get('email')),
            password: String(form.get('password')),
          });
        }}
      >
        <FormProblem error={setUp.error} noteRef={problem.note} />
        <Field label="Your name" hint="As it shall be printed in the record." error={problem.fieldError('name')}>
          {(parts) => <input {...parts} name="name" autoComplete="name" required className="input" />}
        </Field>
        <Field label="Mail address" error={problem.fieldError('email')}>
          {(parts) => <input {...parts} name="email" type="email" autoComplete="username" required className="input" />}
        </Field>
        <Field
          label="Password"
          hint="At least 15 characters. A sentence of a few words is easy to remember."
          error={problem.fieldError('password')}
        >
          {(parts) => (
            <input {...parts} name="password" type="password" autoComplete="new-password" required className="input" />
          )}
        </Field>
        <Button type="submit" disabled={setUp.isPending}>
          Set up Stemma
        </Button>
      </form>
    </SessionFrame>
  );
}
