import type { ReactNode } from 'react';

/**
 * Nothing to show, and why that is or what comes first.
 * @param act the link or button that begins, for whoever may
 */
export function EmptyState({
  title,
  children,
  act,
}: {
  title: ReactNode;
  children?: ReactNode;
  act?: ReactNode;
}) {
  return (
    <div className="border border-dashed border-line px-5 py-7">
      <p className="font-serif text-md">{title}</p>
      {children ? <div className="mt-1 max-w-prose text-ink-soft">{children}</div> : null}
      {act ? <div className="mt-4">{act}</div> : null}
    </div>
  );
}
