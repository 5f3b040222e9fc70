'use client';

import Link from 'next/link';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { passwordHint } from '@/components/account/password-hint';
import { useLinkToken } from '@/components/account/use-link-token';
import { Button } from '@/components/ui/button';
import { Field } from '@/components/ui/field';
import { FormError } from '@/components/ui/form-error';
import { requestJson } from '@/lib/client/request-json';
import { showFaults } from '@/lib/client/show-faults';

interface Values {
  password: string;
}

/** Sets a new password by the link from a mail. */
export function NewPasswordForm() {
  const token = useLinkToken();
  const [isSet, setIsSet] = useState(false);
  const form = useForm<Values>({ defaultValues: { password: '' } });
  const { errors, isSubmitting } = form.formState;
  const send = form.handleSubmit(async ({ password }) => {
    try {
      await requestJson('/password-resets/complete', { body: { token, password } });
      setIsSet(true);
    } catch (error) {
      showFaults(form, error, ['password']);
    }
  });
  if (token === null)
    return (
      <p>
        Open the link from the mail, or <Link href="/forgotten-password">ask for a new one</Link>.
      </p>
    );
  if (isSet)
    return (
      <p role="status">
        The new password is set, and every browser has been signed out. <Link href="/sign-in">Sign in</Link>
      </p>
    );
  return (
    <form className="signin" method="post" onSubmit={(event) => void send(event)} noValidate>
      <Field label="New password" hint={passwordHint} error={errors.password?.message}>
        {(control) => (
          <input
            type="password"
            autoComplete="new-password"
            {...control}
            {...form.register('password', { required: 'Type a new password.' })}
          />
        )}
      </Field>
      <FormError message={errors.root?.message} />
      <div className="acts">
        <Button type="submit" why={isSubmitting ? 'Being set.' : null}>
          Set the password
        </Button>
      </div>
    </form>
  );
}
