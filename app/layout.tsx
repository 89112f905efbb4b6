import type { Metadata, Viewport } from 'next';
import { connection } from 'next/server';
import type { ReactNode } from 'react';
import { SkipLink } from '@/components/layout/skip-link';
import './globals.css';

export const metadata: Metadata = {
  title: { default: 'Stepwell', template: '%s · Stepwell' },
  description: 'Coordinates multi-site dose-finding trials, one measured step after another.',
  robots: { index: false, follow: false },
};

export const viewport: Viewport = {
  width: 'device-width',
  initialScale: 1,
  themeColor: [
    { media: '(prefers-color-scheme: light)', color: '#fbf8f2' },
    { media: '(prefers-color-scheme: dark)', color: '#14191d' },
  ],
};

/** The frame of every page. It waits for the request, so that the nonce of the answer reaches every script. */
export default async function RootLayout({ children }: { children: ReactNode }) {
  await connection();
  return (
    <html lang="en">
      <body>
        <SkipLink />
        {children}
      </body>
    </html>
  );
}
