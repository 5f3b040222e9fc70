'use client';

import { useRouter } from 'next/navigation';
import { useForm, useWatch } from 'react-hook-form';
import { z } from 'zod';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { Field } from '@/components/ui/field';
import { FormError } from '@/components/ui/form-error';
import { requestJson } from '@/lib/client/request-json';
import { showFaults } from '@/lib/client/show-faults';
import { idSchema } from '@/lib/contracts/common';
import type { Animal } from '@/lib/contracts/lab';
import { formatDate } from '@/lib/format/format-date';

interface Values {
  animalId: string;
  startedAt: string;
  name: string;
}

/** Opens a recording session and leads to bringing its files in. Without a name it is called by animal and day. */
export function CreateSession({
  studyId,
  animals,
  kind = 'filled',
}: {
  studyId: string;
  animals: readonly Animal[];
  kind?: 'filled' | 'plain';
}) {
  const router = useRouter();
  const form = useForm<Values>({
    defaultValues: { animalId: animals[0]?.id ?? '', startedAt: '', name: '' },
  });
  const { errors, isSubmitting, isSubmitSuccessful } = form.formState;
  const [animalId, startedAt] = useWatch({ control: form.control, name: ['animalId', 'startedAt'] });
  const code = animals.find((animal) => animal.id === animalId)?.code ?? '';
  const proposed = startedAt ? `${code}, ${formatDate(startedAt.slice(0, 10))}` : '';
  const send = form.handleSubmit(async (values) => {
    const body = {
      studyId,
      animalId: values.animalId,
      // the field holds the wall clock of this browser; the service keeps UTC
      startedAt: new Date(values.startedAt).toISOString(),
      name: values.name.trim() || proposed,
    };
    try {
      const session = await requestJson('/sessions', { body, schema: z.looseObject({ id: idSchema }) });
      router.push(`/sessions/${session.id}/intake`);
    } catch (error) {
      showFaults(form, error, ['animalId', 'startedAt', 'name']);
    }
  });
  return (
    <Dialog title="New recording session" trigger={<Button kind={kind}>Bring a session in</Button>}>
      <form onSubmit={(event) => void send(event)} noValidate>
        <div className="stack-fields">
          <Field label="Animal" error={errors.animalId?.message}>
            {(control) => (
              <select {...control} {...form.register('animalId', { required: 'Choose the animal.' })}>
                {animals.map((animal) => (
                  <option key={animal.id} value={animal.id}>
                    {animal.code}
                  </option>
                ))}
              </select>
            )}
          </Field>
          <Field label="Started" hint="Your local time; it is kept in UTC." error={errors.startedAt?.message}>
            {(control) => (
              <input
                type="datetime-local"
                {...control}
                {...form.register('startedAt', { required: 'Say when the recording started, day and time.' })}
              />
            )}
          </Field>
          <Field
            label="Name"
            hint={
              proposed
                ? `Left empty, it is called “${proposed}”.`
                : 'Left empty, it is called by animal and day.'
            }
            error={errors.name?.message}
          >
            {(control) => <input type="text" {...control} {...form.register('name')} />}
          </Field>
        </div>
        <FormError message={errors.root?.message} />
        <div className="acts">
          <Button type="submit" why={isSubmitting || isSubmitSuccessful ? 'Being opened.' : null}>
            Open the session
          </Button>
        </div>
      </form>
    </Dialog>
  );
}
