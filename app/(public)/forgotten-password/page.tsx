import type { Metadata } from 'next';
import { ForgottenPasswordForm } from '@/components/account/forgotten-password-form';
import { MessageSheet } from '@/components/shell/message-sheet';

export const metadata: Metadata = { title: 'Forgotten password', referrer: 'no-referrer' };

export default function ForgottenPasswordPage() {
  return (
    <MessageSheet title="Forgotten password">
      <ForgottenPasswordForm />
    </MessageSheet>
  );
}
