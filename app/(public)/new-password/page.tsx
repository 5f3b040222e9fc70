import type { Metadata } from 'next';
import { NewPasswordForm } from '@/components/account/new-password-form';
import { MessageSheet } from '@/components/shell/message-sheet';

export const metadata: Metadata = { title: 'New password', referrer: 'no-referrer' };

export default function NewPasswordPage() {
  return (
    <MessageSheet title="Set a new password">
      <NewPasswordForm />
    </MessageSheet>
  );
}
