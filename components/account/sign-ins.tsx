'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { ChangePasswordForm } from '@/components/account/change-password-form';
import { SignInTable } from '@/components/account/sign-in-table';
import { Button } from '@/components/ui/button';
import { FormError } from '@/components/ui/form-error';
import { Section } from '@/components/ui/section';
import { requestJson } from '@/lib/client/request-json';
import type { SignIn } from '@/lib/contracts/account';

/** Password and open sessions belong together: changing the one ends the others. */
export function SignIns({ signIns }: { signIns: readonly SignIn[] }) {
  const router = useRouter();
  const [refusal, setRefusal] = useState<string | null>(null);
  const act = async (path: string, method: 'POST' | 'DELETE') => {
    setRefusal(null);
    try {
      await requestJson(path, { method });
    } catch (error) {
      setRefusal(error instanceof Error ? error.message : 'That did not work.');
    }
    router.refresh();
  };
  return (
    <>
      <Section
        title="Sessions"
        id="sessions"
        why="Where you are signed in. A session ends by itself after 12 h unused."
      >
        <SignInTable signIns={signIns} onEnd={(item) => void act(`/me/sign-ins/${item.id}`, 'DELETE')} />
        <FormError message={refusal} />
        {signIns.length > 1 ? (
          <div className="acts">
            <Button kind="plain" onClick={() => void act('/me/sign-ins/end-others', 'POST')}>
              End the others
            </Button>
          </div>
        ) : null}
      </Section>
      <Section title="Password" id="password" why="A new one ends your other sessions, and a mail tells you.">
        <ChangePasswordForm onChanged={() => router.refresh()} />
      </Section>
    </>
  );
}
