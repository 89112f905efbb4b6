'use client';

import { useCallback, useEffect, useRef } from 'react';

/**
 * The server's clock as the browser can follow it: the time the page was read at, and what has passed since. A phone
 * whose own clock is wrong still gets the right minute.
 * @param readAt the server's time when the page was made, ISO 8601
 * @returns a function for event handlers and effects that gives the milliseconds of now
 */
export function useServerClock(readAt: string): () => number {
  const anchor = useRef<{ server: number; browser: number } | null>(null);
  useEffect(() => {
    anchor.current = { server: Date.parse(readAt), browser: Date.now() };
  }, [readAt]);
  return useCallback(() => {
    const { server, browser } = anchor.current ?? { server: 0, browser: 0 };
    return server + (Date.now() - browser);
  }, []);
}
