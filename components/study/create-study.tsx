'use client';

import { useRouter } from 'next/navigation';
import { useForm } from 'react-hook-form';
import { z } from 'zod';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { Field } from '@/components/ui/field';
import { FormError } from '@/components/ui/form-error';
import { requestJson } from '@/lib/client/request-json';
import { showFaults } from '@/lib/client/show-faults';
import { idSchema } from '@/lib/contracts/common';

interface Values {
  name: string;
  question: string;
}

/** Opens a study: its name and the one question that it asks. Leads to the new study's page. */
export function CreateStudy() {
  const router = useRouter();
  const form = useForm<Values>({ defaultValues: { name: '', question: '' } });
  const { errors, isSubmitting, isSubmitSuccessful } = form.formState;
  const send = form.handleSubmit(async (values) => {
    try {
      const study = await requestJson('/studies', { body: values, schema: z.looseObject({ id: idSchema }) });
      router.push(`/studies/${study.id}`);
    } catch (error) {
      showFaults(form, error, ['name', 'question']);
    }
  });
  return (
    <Dialog title="New study" trigger={<Button>New study</Button>}>
      <form onSubmit={(event) => void send(event)} noValidate>
        <div className="stack-fields">
          <Field label="Name" error={errors.name?.message}>
            {(control) => (
              <input
                type="text"
                {...control}
                {...form.register('name', {
                  required: 'Give the study a name, as in “Shared motion in MT and MST”.',
                })}
              />
            )}
          </Field>
          <Field
            label="Question"
            hint="One sentence; it stands on top of the study. It can be left out."
            error={errors.question?.message}
          >
            {(control) => <textarea rows={3} {...control} {...form.register('question')} />}
          </Field>
        </div>
        <FormError message={errors.root?.message} />
        <div className="acts">
          <Button type="submit" why={isSubmitting || isSubmitSuccessful ? 'Being created.' : null}>
            Create the study
          </Button>
        </div>
      </form>
    </Dialog>
  );
}
