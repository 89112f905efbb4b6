'use client';

import {
  createContext,
  useCallback,
  useContext,
  useEffect,
  useMemo,
  useRef,
  useState,
  type ReactNode,
} from 'react';
import { Notice } from '../ui/notice';

interface Said {
  readonly spot: string;
  readonly text: string;
  /** Counts what was said, so that the same sentence said again is announced again. */
  readonly count: number;
}

const SaidContext = createContext<{ said: Said | null; say: (spot: string, text: string) => void } | null>(
  null,
);

/** Keeps what was recorded last in view while the form that recorded it gives way to the next one. */
export function SavedNoticeProvider({ children }: { children: ReactNode }) {
  const [said, setSaid] = useState<Said | null>(null);
  const say = useCallback(
    (spot: string, text: string) => setSaid((before) => ({ spot, text, count: (before?.count ?? 0) + 1 })),
    [],
  );
  const value = useMemo(() => ({ said, say }), [said, say]);
  return <SaidContext value={value}>{children}</SaidContext>;
}

function useSaid() {
  const value = useContext(SaidContext);
  if (!value) throw new Error('A form of a cohort stands outside <SavedNoticeProvider>.');
  return value;
}

/** Says at a spot of the page that something was recorded. */
export function useSay(): (spot: string, text: string) => void {
  return useSaid().say;
}

/** The spot where it is said; it takes the focus, which the form that is gone had. */
export function SavedNotice({ spot }: { spot: string }) {
  const { said } = useSaid();
  const box = useRef<HTMLDivElement>(null);
  const own = said?.spot === spot ? said : null;
  useEffect(() => {
    if (own) box.current?.focus();
  }, [own]);
  return (
    <div ref={box} tabIndex={-1} className={own ? 'my-3' : undefined}>
      {own ? (
        <Notice key={own.count} kind="saved">
          {own.text}
        </Notice>
      ) : null}
    </div>
  );
}
