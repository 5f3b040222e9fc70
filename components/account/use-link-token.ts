'use client';

import { useEffect, useState } from 'react';

/**
 * The secret of the link that led here, from behind `#`; undefined before the browser has told, null where there is
 * none. It is taken out of the address bar at once, so that it does not stay in the history.
 */
export function useLinkToken(): string | null | undefined {
  const [token, setToken] = useState<string | null | undefined>(undefined);
  useEffect(() => {
    const fragment = window.location.hash.slice(1);
    // eslint-disable-next-line react-hooks/set-state-in-effect -- the fragment is known in the browser only
    setToken((known) => known ?? (fragment === '' ? null : fragment));
    if (fragment !== '') window.history.replaceState(window.history.state, '', window.location.pathname);
  }, []);
  return token;
}
