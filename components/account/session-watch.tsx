'use client';

import { useEffect, useRef, useState } from 'react';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { untilNextLook, WARN_BEFORE_MS } from './session-clock';

type Standing = 'fine' | 'ending' | 'last' | 'ended';

/** Asks the server about the session: a GET leaves its idle time alone, a POST begins it anew. */
async function ask(method: 'GET' | 'POST'): Promise<{ left: number } | 'ended' | 'unknown'> {
  try {
    const answer = await fetch('/api/session', { method, cache: 'no-store' });
    if (answer.status === 401) return 'ended';
    if (!answer.ok) return 'unknown';
    const { sessionStateSchema } = await import('@/lib/schemas/account');
    const { endsAt, now } = sessionStateSchema.parse(await answer.json());
    return { left: Date.parse(endsAt) - Date.parse(now) };
  } catch {
    // Without an answer nobody knows; it is asked again later.
    return 'unknown';
  }
}

/**
 * Warns two minutes before the session ends, with a button that prolongs it, and says when it has ended. Nothing typed
 * on the page is touched (WCAG 2.2, 2.2.1).
 * @param left milliseconds until the session ends, as the server counted when it made the page
 */
export function SessionWatch({ left }: { left: number }) {
  const [standing, setStanding] = useState<Standing>('fine');
  const timer = useRef<number>(undefined);
  const act = useRef<(method: 'GET' | 'POST') => void>(() => undefined);

  useEffect(() => {
    let gone = false;
    const look = async (method: 'GET' | 'POST') => {
      window.clearTimeout(timer.current);
      const answer = await ask(method);
      if (gone) return;
      if (answer === 'ended') {
        setStanding('ended');
        return;
      }
      const remaining = answer === 'unknown' ? WARN_BEFORE_MS : answer.left;
      if (answer !== 'unknown') {
        setStanding(remaining > WARN_BEFORE_MS ? 'fine' : method === 'POST' ? 'last' : 'ending');
      }
      timer.current = window.setTimeout(() => void look('GET'), untilNextLook(remaining));
    };
    act.current = (method) => void look(method);
    timer.current = window.setTimeout(() => void look('GET'), untilNextLook(left));
    return () => {
      gone = true;
      window.clearTimeout(timer.current);
    };
  }, [left]);

  if (standing === 'fine') return null;
  return (
    <div className="fixed right-4 bottom-4 z-40 max-w-sm border border-line bg-paper shadow-sm print:hidden">
      {standing === 'ended' ? (
        <Notice kind="refused" title="Your session has ended.">
          What you typed on this page is still here.{' '}
          <a href="/sign-in" target="_blank" rel="noopener">
            Sign in in another tab
          </a>
          , then send it.
        </Notice>
      ) : (
        <Notice kind="waiting" title="Your session ends in less than two minutes.">
          {standing === 'last' ? (
            'It is twelve hours since you signed in. Send what you typed; then sign in again.'
          ) : (
            <span className="mt-1.5 block">
              <Button small onClick={() => act.current('POST')}>
                Stay signed in
              </Button>
            </span>
          )}
        </Notice>
      )}
    </div>
  );
}
