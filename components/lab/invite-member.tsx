'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { roleOptions } from '@/components/lab/role-words';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { Field } from '@/components/ui/field';
import { FormError } from '@/components/ui/form-error';
import { requestJson } from '@/lib/client/request-json';
import { showFaults } from '@/lib/client/show-faults';
import type { Role } from '@/lib/contracts/lab';

interface Values {
  email: string;
  role: Role;
}

/** Invites an address to the lab. */
export function InviteMember() {
  const router = useRouter();
  const [isOpen, setIsOpen] = useState(false);
  const form = useForm<Values>({ defaultValues: { email: '', role: 'observer' } });
  const { errors, isSubmitting } = form.formState;
  const send = form.handleSubmit(async ({ email, role }) => {
    try {
      await requestJson('/invitations', { body: { email: email.trim(), role } });
      form.reset();
      setIsOpen(false);
      router.refresh();
    } catch (error) {
      showFaults(form, error, ['email', 'role']);
    }
  });
  return (
    <Dialog
      open={isOpen}
      onOpenChange={setIsOpen}
      title="Invite a member"
      trigger={<Button>Invite a member</Button>}
    >
      <form onSubmit={(event) => void send(event)} noValidate>
        <div className="stack-fields">
          <Field label="Mail address" error={errors.email?.message}>
            {(control) => (
              <input
                type="email"
                autoComplete="off"
                autoCapitalize="none"
                spellCheck={false}
                {...control}
                {...form.register('email', { required: 'Type the address to invite.' })}
              />
            )}
          </Field>
          <Field label="Role" hint="It can be changed later." error={errors.role?.message}>
            {(control) => (
              <select {...control} {...form.register('role')}>
                {roleOptions.map((option) => (
                  <option key={option.value} value={option.value}>
                    {option.text}
                  </option>
                ))}
              </select>
            )}
          </Field>
        </div>
        <FormError message={errors.root?.message} />
        <div className="acts">
          <Button type="submit" why={isSubmitting ? 'Being sent.' : null}>
            Send the invitation
          </Button>
        </div>
      </form>
    </Dialog>
  );
}
