'use client';

import { useRouter } from 'next/navigation';
import type { ComponentProps, MouseEvent } from 'react';

/** Whether a click on a link is the browser's to follow: a new tab, a download, another place, an address that is no page. */
function isBrowsers(event: MouseEvent<HTMLAnchorElement>): boolean {
  const link = event.currentTarget;
  return (
    event.defaultPrevented ||
    event.button !== 0 ||
    event.metaKey ||
    event.ctrlKey ||
    event.shiftKey ||
    event.altKey ||
    (link.target !== '' && link.target !== '_self') ||
    link.hasAttribute('download') ||
    link.origin !== location.origin ||
    link.pathname.startsWith('/api/') ||
    (link.hash !== '' && link.pathname === location.pathname && link.search === location.search)
  );
}

/**
 * A link to a page of the application, followed without loading the document anew. Nothing is fetched before the click:
 * every page is made for its reader, so fetching ahead would only cost the database.
 */
export function PageLink({ href, onClick, ...rest }: ComponentProps<'a'> & { href: string }) {
  const router = useRouter();
  return (
    <a
      {...rest}
      href={href}
      onClick={(event) => {
        onClick?.(event);
        if (isBrowsers(event)) return;
        event.preventDefault();
        router.push(href);
      }}
    />
  );
}
