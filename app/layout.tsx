import type { Metadata, Viewport } from 'next';
import { cookies } from 'next/headers';
import type { ReactNode } from 'react';
import { themeCookie } from '@/lib/client/theme-cookie';
import './globals.css';

export const metadata: Metadata = {
  title: { default: 'Outfold', template: '%s · Outfold' },
  description: 'Leak-free cross-validated population readouts, kept on record per recording session.',
  icons: { icon: '/icon.svg' },
  robots: { index: false, follow: false },
};
export const viewport: Viewport = {
  width: 'device-width',
  initialScale: 1,
  themeColor: [
    { media: '(prefers-color-scheme: light)', color: '#FBFAF6' },
    { media: '(prefers-color-scheme: dark)', color: '#15191D' },
  ],
};

export default async function RootLayout({ children }: { children: ReactNode }) {
  // read on the server, so that the first paint has the remembered theme
  const theme = (await cookies()).get(themeCookie)?.value;
  return (
    <html lang="en" data-theme={theme === 'dark' || theme === 'light' ? theme : undefined}>
      <body>{children}</body>
    </html>
  );
}
