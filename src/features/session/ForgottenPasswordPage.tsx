import { useMutation } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import { requestPasswordLink } from '../../../shared/api/session.ts';
import { call } from '../../api/call.ts';
import { paths } from '../../api/paths.ts';
import { Button } from '../../ui/Button.tsx';
import { Field } from '../../ui/Field.tsx';
import { FormProblem } from '../../ui/FormProblem.tsx';
import { useFormProblem } from '../../ui/use-form-problem.ts';
import { SessionFrame } from './SessionFrame.tsx';

export function Component() {
  const ask = useMutation({ mutationFn: (email: string) => call(requestPasswordLink, { body: { email } }) });
  const problem = useFormProblem(ask.error);
  return (
    <SessionFrame title="Forgotten password" problem={ask.isError}>
      {ask.isSuccess ? (
        <p role="status">
          If an account has this address, a mail with a link is on its way. The link works for two hours.
        </p>
      ) : (
        <form
          className="grid gap-4"
          onSubmit={(event) => {
            event.preventDefault();
            ask.mutate(String(new FormData(event.currentTarget).get('email')));
          }}
        >
          <FormProblem error={ask.error} noteRef={problem.note} />
          <Field label="Mail address" error={problem.fieldError('email')}>
            {(parts) => (
              <input {...parts} name="email" type="email" autoComplete="username" required className="input" />
            )}
          </Field>
          <Button type="submit" disabled={ask.isPending}>
            Send me a link
          </Button>
        </form>
      )}
      <Link to={paths.signIn()} className="text-sm text-primary underline">
        Back to signing in
      </Link>
    </SessionFrame>
  );
}
