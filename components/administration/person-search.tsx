import { PageLink } from '@/components/ui/page-link';
import { Button } from '@/components/ui/button';

/** A search among more people than one page lists: a plain form, answered by the server. */
export function PersonSearch({ search, listed, found }: { search: string; listed: number; found: number }) {
  return (
    <form method="get" role="search" className="mb-4 flex flex-wrap items-end gap-x-3 gap-y-2">
      <div className="grid gap-0.5">
        <label htmlFor="person-search" className="text-xs font-semibold text-ink-soft">
          Find among everyone, by a part of name or address
        </label>
        <input
          id="person-search"
          type="search"
          name="search"
          defaultValue={search}
          maxLength={100}
          className="min-h-9 w-72 max-w-full border border-ink-soft bg-paper px-2.5"
        />
      </div>
      <Button small>Find</Button>
      <p className="self-center text-sm text-ink-soft">
        {listed < found ? `The first ${listed} of ${found} are listed.` : `${found} found.`}{' '}
        {search ? <PageLink href="/administration/people">Show everyone</PageLink> : null}
      </p>
    </form>
  );
}
