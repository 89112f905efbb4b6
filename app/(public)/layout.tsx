import type { ReactNode } from 'react';
import { TopBar } from '@/components/layout/top-bar';

/** The frame of what a visitor sees without being signed in. */
export default function PublicLayout({ children }: { children: ReactNode }) {
  return (
    <>
      <TopBar nav={[]} />
      {children}
    </>
  );
}
