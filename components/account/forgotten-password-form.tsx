'use client';

import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { Button } from '@/components/ui/button';
import { Field } from '@/components/ui/field';
import { FormError } from '@/components/ui/form-error';
import { requestJson } from '@/lib/client/request-json';
import { showFaults } from '@/lib/client/show-faults';

interface Values {
  email: string;
}

/** Asks for a link to set a new password. What it says afterwards is the same whether the address has an account. */
export function ForgottenPasswordForm() {
  const [sentTo, setSentTo] = useState<string | null>(null);
  const form = useForm<Values>({ defaultValues: { email: '' } });
  const { errors, isSubmitting } = form.formState;
  const send = form.handleSubmit(async ({ email }) => {
    try {
      await requestJson('/password-resets', { body: { email: email.trim() } });
      setSentTo(email.trim());
    } catch (error) {
      showFaults(form, error, ['email']);
    }
  });
  if (sentTo)
    return (
      <p role="status">
        If <b>{sentTo}</b> has an account, a mail with a link is on its way. The link works once, for an hour.
      </p>
    );
  return (
    <form className="signin" method="post" onSubmit={(event) => void send(event)} noValidate>
      <Field label="Mail address" error={errors.email?.message}>
        {(control) => (
          <input
            type="email"
            autoComplete="username"
            autoCapitalize="none"
            spellCheck={false}
            {...control}
            {...form.register('email', { required: 'Type the mail address of your account.' })}
          />
        )}
      </Field>
      <FormError message={errors.root?.message} />
      <div className="acts">
        <Button type="submit" why={isSubmitting ? 'Being sent.' : null}>
          Send a link
        </Button>
      </div>
    </form>
  );
}
