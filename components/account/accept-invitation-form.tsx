'use client';

import Link from 'next/link';
import { useEffect, useState } from 'react';
import { useForm } from 'react-hook-form';
import { passwordHint } from '@/components/account/password-hint';
import { useLinkToken } from '@/components/account/use-link-token';
import { Button } from '@/components/ui/button';
import { Field } from '@/components/ui/field';
import { FormError } from '@/components/ui/form-error';
import { requestJson } from '@/lib/client/request-json';
import { showFaults } from '@/lib/client/show-faults';
import { signIn } from '@/lib/client/sign-in';
import { invitationLookSchema, type InvitationLook } from '@/lib/contracts/account';

interface Values {
  name: string;
  password: string;
}

/** Shows what an invitation is about and accepts it: with a new account, or with the password that the address has. */
export function AcceptInvitationForm() {
  const token = useLinkToken();
  const [look, setLook] = useState<InvitationLook | null>(null);
  const [refusal, setRefusal] = useState<string | null>(null);
  useEffect(() => {
    if (!token) return;
    requestJson('/invitations/look', { body: { token }, schema: invitationLookSchema }).then(
      setLook,
      (error: unknown) =>
        setRefusal(error instanceof Error ? error.message : 'The invitation could not be read.'),
    );
  }, [token]);

  const form = useForm<Values>({ defaultValues: { name: '', password: '' } });
  const { errors, isSubmitting, isSubmitSuccessful } = form.formState;
  const send = form.handleSubmit(async ({ name, password }) => {
    if (!token || !look) return;
    try {
      await requestJson('/invitations/accept', {
        body: { token, password, ...(look.hasAccount ? {} : { name }) },
      });
      const outcome = await signIn(look.email, password);
      // a full load, so that every part of the page sees the new session
      window.location.assign(outcome.isSignedIn ? '/' : '/sign-in');
    } catch (error) {
      showFaults(form, error, ['name', 'password']);
    }
  });

  if (token === null)
    return <p>Open the link from the mail: this page alone does not know the invitation.</p>;
  if (refusal) return <FormError message={refusal} />;
  if (!look) return <p role="status">Reading the invitation.</p>;
  return (
    <>
      <p>
        {look.inviterName} invites <b>{look.email}</b> to <b>{look.labName}</b> as {look.role}.
      </p>
      <form className="signin" method="post" onSubmit={(event) => void send(event)} noValidate>
        <input type="email" autoComplete="username" value={look.email} readOnly hidden />
        {look.hasAccount ? null : (
          <Field
            label="Your name"
            hint="As it shall stand beside your notes and readouts."
            error={errors.name?.message}
          >
            {(control) => (
              <input
                type="text"
                autoComplete="name"
                {...control}
                {...form.register('name', { required: 'Type your name.' })}
              />
            )}
          </Field>
        )}
        <Field
          label={look.hasAccount ? 'The password of your account' : 'A new password'}
          hint={look.hasAccount ? 'This address has an account already; it joins the lab.' : passwordHint}
          error={errors.password?.message}
        >
          {(control) => (
            <input
              type="password"
              autoComplete={look.hasAccount ? 'current-password' : 'new-password'}
              {...control}
              {...form.register('password', { required: 'Type a password.' })}
            />
          )}
        </Field>
        <FormError message={errors.root?.message} />
        <div className="acts">
          <Button type="submit" why={isSubmitting || isSubmitSuccessful ? 'Being accepted.' : null}>
            Accept and sign in
          </Button>
          {look.hasAccount ? (
            <Link className="quiet" href="/forgotten-password">
              Forgotten the password
            </Link>
          ) : null}
        </div>
      </form>
    </>
  );
}
