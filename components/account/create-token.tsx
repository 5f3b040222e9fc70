'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { daysFromNow } from '@/components/account/days-from-now';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { Field } from '@/components/ui/field';
import { FormError } from '@/components/ui/form-error';
import { requestJson } from '@/lib/client/request-json';
import { showFaults } from '@/lib/client/show-faults';
import { createdTokenSchema, type Scope } from '@/lib/contracts/lab';

const words: Record<Scope, string> = {
  read: 'read everything',
  intake: 'bring sessions in, and leave trials or units out',
  readouts: 'run and cancel readouts',
  manage: 'change studies, animals and sessions, and look after members and tokens',
};

interface Values {
  name: string;
  scopes: Scope[];
  days: string;
}

/** Makes a token and shows it once, to be copied. */
export function CreateToken({ scopes }: { scopes: readonly Scope[] }) {
  const router = useRouter();
  const [isOpen, setIsOpen] = useState(false);
  const [token, setToken] = useState<string | null>(null);
  const form = useForm<Values>({ defaultValues: { name: '', scopes: ['read'], days: '90' } });
  const { errors, isSubmitting } = form.formState;
  const send = form.handleSubmit(async ({ name, scopes: chosen, days }) => {
    try {
      const made = await requestJson('/tokens', {
        body: {
          name,
          scopes: chosen,
          expiresAt: daysFromNow(Number(days)),
        },
        schema: createdTokenSchema,
      });
      setToken(made.token);
    } catch (error) {
      showFaults(form, error, ['name', 'scopes']);
    }
  });
  const setOpen = (open: boolean) => {
    setIsOpen(open);
    if (!open) {
      if (token) router.refresh();
      setToken(null);
      form.reset();
    }
  };
  return (
    <Dialog open={isOpen} onOpenChange={setOpen} title="New token" trigger={<Button>New token</Button>}>
      {token ? (
        <>
          <p>Copy it now: it is not kept and cannot be shown again.</p>
          <Field label="Token">
            {(control) => (
              <input
                type="text"
                className="n"
                readOnly
                value={token}
                id={control.id}
                onFocus={(event) => event.target.select()}
              />
            )}
          </Field>
          <div className="acts">
            <Button onClick={() => setOpen(false)}>It is copied</Button>
          </div>
        </>
      ) : (
        <form onSubmit={(event) => void send(event)} noValidate>
          <div className="stack-fields">
            <Field label="Name" hint="Where it will be used, as in “rig 2”." error={errors.name?.message}>
              {(control) => (
                <input
                  type="text"
                  autoComplete="off"
                  {...control}
                  {...form.register('name', { required: 'Give it a name.' })}
                />
              )}
            </Field>
            <div className="field" role="group" aria-labelledby="token-scopes">
              <span id="token-scopes">It may</span>
              {scopes.map((scope) => (
                <label key={scope} className="tick">
                  <input
                    type="checkbox"
                    value={scope}
                    {...form.register('scopes', {
                      validate: (chosen) => chosen.length > 0 || 'Choose at least one.',
                    })}
                  />{' '}
                  {words[scope]}
                </label>
              ))}
              {errors.scopes ? <p className="err">{errors.scopes.message}</p> : null}
            </div>
            <Field label="Ends after">
              {(control) => (
                <select {...control} {...form.register('days')}>
                  <option value="7">7 days</option>
                  <option value="30">30 days</option>
                  <option value="90">90 days</option>
                  <option value="365">a year</option>
                </select>
              )}
            </Field>
          </div>
          <FormError message={errors.root?.message} />
          <div className="acts">
            <Button type="submit" why={isSubmitting ? 'Being made.' : null}>
              Make the token
            </Button>
          </div>
        </form>
      )}
    </Dialog>
  );
}
