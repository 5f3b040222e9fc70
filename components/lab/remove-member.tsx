'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { requestJson } from '@/lib/client/request-json';
import type { Member } from '@/lib/contracts/account';

/** Ends a membership after saying what that does. */
export function RemoveMember({
  member,
  onRefused,
}: {
  member: Member;
  onRefused: (message: string | null) => void;
}) {
  const router = useRouter();
  const [isOpen, setIsOpen] = useState(false);
  const remove = async () => {
    onRefused(null);
    try {
      await requestJson(`/members/${member.userId}`, { method: 'DELETE' });
    } catch (error) {
      onRefused(error instanceof Error ? error.message : 'That did not work.');
    }
    setIsOpen(false);
    router.refresh();
  };
  return (
    <Dialog
      open={isOpen}
      onOpenChange={setIsOpen}
      title={`Remove ${member.name}`}
      why="The lab’s pages close for this member at once, and the member’s tokens here end. Readouts, exclusions and the record keep the name. A new invitation brings the member back, without the old tokens."
      trigger={<Button kind="link">Remove</Button>}
    >
      <div className="acts">
        <Button kind="danger" onClick={() => void remove()}>
          Remove {member.name} from the lab
        </Button>
      </div>
    </Dialog>
  );
}
