'use client';

import { useRouter } from 'next/navigation';
import { useEffect, useState } from 'react';
import { useServerClock } from '../ui/use-server-clock';

const MINUTE = 60_000;
const HOUR = 60 * MINUTE;
const DAY = 24 * HOUR;

const count = (number: number, word: string) => `${number} ${word}${number === 1 ? '' : 's'}`;

/**
 * A span of time in its two largest units: "3 days 4 hours", "59 minutes".
 * @param milliseconds at least 0; less than a minute is "less than a minute"
 */
export function spanText(milliseconds: number): string {
  if (milliseconds < MINUTE) return 'less than a minute';
  const days = Math.floor(milliseconds / DAY);
  const hours = Math.floor((milliseconds % DAY) / HOUR);
  const minutes = Math.floor((milliseconds % HOUR) / MINUTE);
  const parts =
    days > 0
      ? [
          [days, 'day'],
          [hours, 'hour'],
        ]
      : [
          [hours, 'hour'],
          [minutes, 'minute'],
        ];
  return parts
    .filter(([number]) => Number(number) > 0)
    .map(([number, word]) => count(Number(number), String(word)))
    .join(' ');
}

/**
 * The time left until an observation window ends, counted down on the server's clock; when it has ended the page is
 * asked for again, so that what can now be recorded is offered.
 */
export function TimeLeft({ endsAt, readAt }: { endsAt: string; readAt: string }) {
  const router = useRouter();
  const serverNow = useServerClock(readAt);
  const atReading = Date.parse(endsAt) - Date.parse(readAt);
  const [counted, setCounted] = useState({ readAt, left: atReading });
  const left = counted.readAt === readAt ? counted.left : atReading;
  useEffect(() => {
    if (atReading <= 0) return;
    const timer = setInterval(() => {
      const now = Date.parse(endsAt) - serverNow();
      setCounted({ readAt, left: now });
      if (now > 0) return;
      clearInterval(timer);
      router.refresh();
    }, 15_000);
    return () => clearInterval(timer);
  }, [endsAt, readAt, atReading, serverNow, router]);
  return left > 0 ? <>{spanText(left)} left</> : <>ended</>;
}
