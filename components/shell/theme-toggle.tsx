'use client';

import { themeCookie } from '@/lib/client/theme-cookie';

/** Changes between light and dark and remembers it for a year. The word names what a press gives; CSS picks it, so it is right before hydration. */
export function ThemeToggle({ className }: { className?: string }) {
  const flip = () => {
    const root = document.documentElement;
    const chosen = root.dataset.theme;
    const isDark = chosen ? chosen === 'dark' : matchMedia('(prefers-color-scheme: dark)').matches;
    const next = isDark ? 'light' : 'dark';
    root.dataset.theme = next;
    document.cookie = `${themeCookie}=${next}; path=/; max-age=31536000; samesite=lax`;
  };
  return (
    <button type="button" className={className} onClick={flip}>
      <span className="theme-word-dark">Dark</span>
      <span className="theme-word-light">Light</span>
    </button>
  );
}
