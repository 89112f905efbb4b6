import type { ReactNode } from 'react';

export const metadata = { title: 'A bare page' };

export default function RootLayout({ children }: { children: ReactNode }) {
  return (
    <html lang="en">
      <body>{children}</body>
    </html>
  );
}
