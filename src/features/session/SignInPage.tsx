import { useMutation, useQueryClient } from '@tanstack/react-query';
import { Link, Navigate, useNavigate, useSearchParams } from 'react-router-dom';
import { signIn } from '../../../shared/api/session.ts';
import { call } from '../../api/call.ts';
import { paths } from '../../api/paths.ts';
import { sessionQuery, useSession } from '../../api/session.ts';
import { Button } from '../../ui/Button.tsx';
import { Field } from '../../ui/Field.tsx';
import { FormProblem } from '../../ui/FormProblem.tsx';
import { useFormProblem } from '../../ui/use-form-problem.ts';
import { SessionFrame } from './SessionFrame.tsx';

/** Only a path of this app may be returned to. Resolved first: browsers read `//elsewhere` and `/\elsewhere` as a host. */
function safeReturn(to: string | null): string {
  const here = window.location.origin;
  if (!to?.startsWith('/') || !URL.canParse(to, here)) return paths.home();
  const { origin, pathname, search } = new URL(to, here);
  return origin === here && !pathname.startsWith('//') ? pathname + search : paths.home();
}

export function Component() {
  const [search] = useSearchParams();
  const returnTo = safeReturn(search.get('to'));
  const navigate = useNavigate();
  const queryClient = useQueryClient();
  const session = useSession();
  const enter = useMutation({
    mutationFn: (body: { email: string; password: string }) => call(signIn, { body }),
    onSuccess: async ({ actor }) => {
      queryClient.setQueryData(sessionQuery.queryKey, { actor, needsSetup: false });
      await navigate(returnTo, { replace: true });
    },
  });
  const problem = useFormProblem(enter.error);
  if (session.data?.actor && !enter.isPending) return <Navigate to={returnTo} replace />;

  return (
    <SessionFrame title="Sign in" problem={enter.isError}>
      <form
        className="grid gap-4"
        onSubmit={(event) => {
          event.preventDefault();
          const form = new FormData(event.currentTarget);
          enter.mutate({ email: String(form.get('email')), password: String(form.get('password')) });
        }}
      >
        <FormProblem error={enter.error} noteRef={problem.note} />
        {returnTo !== paths.home() && !enter.error && (
          <p className="text-sm">Sign in to open what the link leads to.</p>
        )}
        <Field label="Mail address">
          {(parts) => <input {...parts} name="email" type="email" autoComplete="username" required className="input" />}
        </Field>
        <Field label="Password">
          {(parts) => (
            <input
              {...parts}
              name="password"
              type="password"
              autoComplete="current-password"
              required
              className="input"
            />
          )}
        </Field>
        <Button type="submit" disabled={enter.isPending}>
          Sign in
        </Button>
        <Link to={paths.forgotten()} className="text-sm text-primary underline">
          I have forgotten my password
        </Link>
      </form>
    </SessionFrame>
  );
}
