import { sessionSchema, signInSchema, type SignInInput } from '@stayledger/shared/contracts/auth';
import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useState, type FormEvent } from 'react';
import { Navigate, useSearchParams } from 'react-router-dom';
import { paths } from '../../app/paths';
import { Attention } from '../../components/feedback/attention';
import { PlainInput } from '../../components/forms/plain-fields';
import { PlainButton } from '../../components/plain-button/plain-button';
import { apiSend } from '../../lib/api-client';
import { sessionQueries } from '../../lib/session.queries';
import { DemoSignIns } from './demo-sign-ins';
import styles from './sign-in.module.css';

export function SignInPage() {
  const [search] = useSearchParams();
  const session = useQuery(sessionQueries.current());
  const signIn = useSignIn();
  const [fieldErrors, setFieldErrors] = useState<Partial<Record<keyof SignInInput, string>>>({});

  if (session.data?.signedIn) return <Navigate to={localAddress(search.get('from'))} replace />;

  const submit = (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault();
    const form = new FormData(event.currentTarget);
    const parsed = signInSchema.safeParse({ email: form.get('email'), password: form.get('password') });
    if (parsed.success) {
      setFieldErrors({});
      signIn.mutate(parsed.data);
      return;
    }
    const wrong = new Set(parsed.error.issues.map((issue) => issue.path[0]));
    setFieldErrors({
      email: wrong.has('email') ? 'Write the address you sign in with.' : undefined,
      password: wrong.has('password') ? 'Write your password.' : undefined,
    });
    const first = wrong.has('email') ? 'email' : 'password';
    event.currentTarget.querySelector<HTMLInputElement>(`[name=${first}]`)?.focus();
  };

  return (
    <main className={styles.page}>
      <title>Sign in · Stayledger</title>
      <section className={styles.sheet}>
        <p className={styles.wordMark}>Stayledger</p>
        <p className={styles.lead}>
          An account of the fatigue allowance of every part of a rig. Recorded loads in, replace-by dates out.
        </p>
        <h1>Sign in</h1>
        <form onSubmit={submit} noValidate>
          <PlainInput
            label="E-mail address"
            name="email"
            type="email"
            autoComplete="username"
            error={fieldErrors.email}
          />
          <PlainInput
            label="Password"
            name="password"
            type="password"
            autoComplete="current-password"
            error={fieldErrors.password}
          />
          {signIn.isError ? <Attention role="alert">{signIn.error.message}</Attention> : null}
          <PlainButton type="submit" weight="primary" className={styles.submit} disabled={signIn.isPending}>
            {signIn.isPending ? 'Signing in…' : 'Sign in'}
          </PlainButton>
        </form>
        <DemoSignIns pending={signIn.isPending} onChoose={(chosen) => signIn.mutate(chosen)} />
      </section>
    </main>
  );
}

function useSignIn() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (input: SignInInput) => apiSend('POST', '/auth/sign-in', sessionSchema, { body: input }),
    onSuccess: (session) => {
      // What an earlier person at this browser saw must not shine through.
      queryClient.removeQueries({ predicate: (query) => query.queryKey[0] !== 'session' });
      queryClient.setQueryData(sessionQueries.current().queryKey, session);
    },
  });
}

/** Only addresses of this application: `//elsewhere` and `https:` would lead away after a sign-in. */
function localAddress(from: string | null): string {
  return from && /^\/(?![/\\])/.test(from) ? from : paths.home.pattern;
}
