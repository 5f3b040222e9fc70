'use client';

import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { passwordHint } from '@/components/account/password-hint';
import { Button } from '@/components/ui/button';
import { Field } from '@/components/ui/field';
import { FormError } from '@/components/ui/form-error';
import { requestJson } from '@/lib/client/request-json';
import { showFaults } from '@/lib/client/show-faults';

interface Values {
  present: string;
  next: string;
}

/** Changes the member's password; their other browser sessions end. `onChanged` lets the list of sessions read again. */
export function ChangePasswordForm({ onChanged }: { onChanged: () => void }) {
  const [isChanged, setIsChanged] = useState(false);
  const form = useForm<Values>({ defaultValues: { present: '', next: '' } });
  const { errors, isSubmitting } = form.formState;
  const send = form.handleSubmit(async (values) => {
    setIsChanged(false);
    try {
      await requestJson('/me/password', { body: values });
      form.reset();
      setIsChanged(true);
      onChanged();
    } catch (error) {
      showFaults(form, error, ['present', 'next']);
    }
  });
  return (
    <form className="signin" method="post" onSubmit={(event) => void send(event)} noValidate>
      <div className="stack-fields">
        <Field label="Present password" error={errors.present?.message}>
          {(control) => (
            <input
              type="password"
              autoComplete="current-password"
              {...control}
              {...form.register('present', { required: 'Type your present password.' })}
            />
          )}
        </Field>
        <Field label="New password" hint={passwordHint} error={errors.next?.message}>
          {(control) => (
            <input
              type="password"
              autoComplete="new-password"
              {...control}
              {...form.register('next', { required: 'Type a new password.' })}
            />
          )}
        </Field>
      </div>
      <FormError message={errors.root?.message} />
      <div className="acts">
        <Button type="submit" kind="plain" why={isSubmitting ? 'Being changed.' : null}>
          Change the password
        </Button>
      </div>
      <p role="status">
        {isChanged ? 'The password is changed; your other browser sessions have ended.' : ''}
      </p>
    </form>
  );
}
