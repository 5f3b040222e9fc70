'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { Field } from '@/components/ui/field';
import { FormError } from '@/components/ui/form-error';
import { requestJson } from '@/lib/client/request-json';
import { showFaults } from '@/lib/client/show-faults';
import type { CreateAnimal as Body } from '@/lib/contracts/lab';

interface Values {
  code: string;
  species: string;
  sex: Body['sex'];
  bornOn: string;
}

/** Adds an animal to a study. `species` proposes the one that the study has already. */
export function CreateAnimal({
  studyId,
  species,
  kind = 'plain',
}: {
  studyId: string;
  species: string;
  kind?: 'filled' | 'plain';
}) {
  const router = useRouter();
  const [isOpen, setIsOpen] = useState(false);
  const form = useForm<Values>({ defaultValues: { code: '', species, sex: 'unknown', bornOn: '' } });
  const { errors, isSubmitting } = form.formState;
  const send = form.handleSubmit(async ({ bornOn, ...values }) => {
    const body: Body = { studyId, ...values, ...(bornOn ? { bornOn } : {}) };
    try {
      await requestJson('/animals', { body });
    } catch (error) {
      showFaults(form, error, ['code', 'species', 'sex', 'bornOn']);
      return;
    }
    setIsOpen(false);
    form.reset({ code: '', species: values.species, sex: 'unknown', bornOn: '' });
    router.refresh();
  });
  return (
    <Dialog
      open={isOpen}
      onOpenChange={setIsOpen}
      title="New animal"
      trigger={<Button kind={kind}>Add an animal</Button>}
    >
      <form onSubmit={(event) => void send(event)} noValidate>
        <div className="stack-fields">
          <Field
            label="Code"
            hint="The lab’s own code or call name. Never anything that identifies a person."
            error={errors.code?.message}
          >
            {(control) => (
              <input
                type="text"
                {...control}
                {...form.register('code', { required: 'Give the animal’s code.' })}
              />
            )}
          </Field>
          <Field label="Species" hint="As in Callithrix jacchus." error={errors.species?.message}>
            {(control) => (
              <input
                type="text"
                {...control}
                {...form.register('species', { required: 'Name the species.' })}
              />
            )}
          </Field>
          <Field label="Sex" error={errors.sex?.message}>
            {(control) => (
              <select {...control} {...form.register('sex')}>
                <option value="unknown">unknown</option>
                <option value="female">female</option>
                <option value="male">male</option>
              </select>
            )}
          </Field>
          <Field label="Date of birth" hint="It can be left out." error={errors.bornOn?.message}>
            {(control) => <input type="date" {...control} {...form.register('bornOn')} />}
          </Field>
        </div>
        <FormError message={errors.root?.message} />
        <div className="acts">
          <Button type="submit" why={isSubmitting ? 'Being added.' : null}>
            Add the animal
          </Button>
        </div>
      </form>
    </Dialog>
  );
}
