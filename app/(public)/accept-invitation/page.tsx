import type { Metadata } from 'next';
import { AcceptInvitationForm } from '@/components/account/accept-invitation-form';
import { MessageSheet } from '@/components/shell/message-sheet';

export const metadata: Metadata = { title: 'Invitation', referrer: 'no-referrer' };

export default function AcceptInvitationPage() {
  return (
    <MessageSheet title="Join a lab">
      <AcceptInvitationForm />
    </MessageSheet>
  );
}
