import { useMutation } from '@tanstack/react-query';
import { Link, useParams } from 'react-router-dom';
import { setPassword } from '../../../shared/api/session.ts';
import { call } from '../../api/call.ts';
import { paths } from '../../api/paths.ts';
import { Button } from '../../ui/Button.tsx';
import { Field } from '../../ui/Field.tsx';
import { FormProblem } from '../../ui/FormProblem.tsx';
import { useFormProblem } from '../../ui/use-form-problem.ts';
import { SessionFrame } from './SessionFrame.tsx';

export function Component() {
  const { token = '' } = useParams();
  const choose = useMutation({ mutationFn: (password: string) => call(setPassword, { body: { token, password } }) });
  const problem = useFormProblem(choose.error);
  return (
    <SessionFrame title="Choose a password" problem={choose.isError}>
      {choose.isSuccess ? (
        <>
          <p role="status">The password is set. Sessions that were open on other devices have ended.</p>
          <Link to={paths.signIn()} className="font-semibold text-primary underline">
            Sign in as {choose.data.email}
          </Link>
        </>
      ) : (
        <form
          className="grid gap-4"
          onSubmit={(event) => {
            event.preventDefault();
            choose.mutate(String(new FormData(event.currentTarget).get('password')));
          }}
        >
          <FormProblem error={choose.error} noteRef={problem.note} />
          <Field
            label="New password"
            hint="At least 15 characters. A sentence of a few words is easy to remember."
            error={problem.fieldError('password')}
          >
            {(parts) => (
              <input
                {...parts}
                name="password"
                type="password"
                autoComplete="new-password"
                required
                className="input"
              />
            )}
          </Field>
          <Button type="submit" disabled={choose.isPending}>
            Set the password
          </Button>
        </form>
      )}
    </SessionFrame>
  );
}
