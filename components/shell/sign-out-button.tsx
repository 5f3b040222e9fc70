'use client';

import { useState } from 'react';
import { signOut } from '@/lib/client/sign-out';

/** Ends the session of this browser and goes to the sign-in page. */
export function SignOutButton() {
  const [isLeaving, setIsLeaving] = useState(false);
  return (
    <button
      type="button"
      aria-disabled={isLeaving || undefined}
      onClick={() => {
        if (isLeaving) return;
        setIsLeaving(true);
        void signOut().finally(() => window.location.assign('/sign-in'));
      }}
    >
      {isLeaving ? 'Signing out' : 'Sign out'}
    </button>
  );
}
