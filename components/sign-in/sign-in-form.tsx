'use client';

import Link from 'next/link';
import { useRef, useState } from 'react';
import { useForm } from 'react-hook-form';
import { Button } from '@/components/ui/button';
import { Field } from '@/components/ui/field';
import { safePath } from '@/lib/client/safe-path';
import { signIn } from '@/lib/client/sign-in';

interface SignInValues {
  email: string;
  password: string;
}

/** Mail address and password; what went wrong stands under the field that it is about. */
export function SignInForm({ next }: { next: string | null }) {
  const { register, handleSubmit, formState, setFocus } = useForm<SignInValues>();
  const [refusal, setRefusal] = useState<string | null>(null);
  const isSending = useRef(false);
  const [isWaiting, setIsWaiting] = useState(false);

  const send = handleSubmit(async ({ email, password }) => {
    if (isSending.current) return;
    isSending.current = true;
    setIsWaiting(true);
    const outcome = await signIn(email.trim(), password);
    if (outcome.isSignedIn) {
      // a full load, so that every part of the page sees the new session
      window.location.assign(safePath(next));
      return;
    }
    isSending.current = false;
    setIsWaiting(false);
    setRefusal(outcome.message);
    setFocus('password', { shouldSelect: true });
  });

  return (
    <form className="signin" method="post" onSubmit={(event) => void send(event)} noValidate>
      <Field label="Mail address" error={formState.errors.email?.message}>
        {(control) => (
          <input
            type="email"
            autoComplete="username"
            autoCapitalize="none"
            spellCheck={false}
            {...control}
            {...register('email', { required: 'Type the mail address that your lab invited.' })}
          />
        )}
      </Field>
      <Field label="Password" error={formState.errors.password?.message ?? refusal}>
        {(control) => (
          <input
            type="password"
            autoComplete="current-password"
            {...control}
            {...register('password', { required: 'Type your password.', onChange: () => setRefusal(null) })}
          />
        )}
      </Field>
      <div className="acts">
        <Button type="submit">{isWaiting ? 'Signing in' : 'Sign in'}</Button>
        <Link className="quiet" href="/forgotten-password">
          Forgotten the password
        </Link>
      </div>
      <p className="vh" role="status">
        {refusal ?? ''}
      </p>
    </form>
  );
}
