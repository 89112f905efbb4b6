import { controlClass } from '@/components/forms/control-class';
import { Button } from '@/components/ui/button';

/**
 * Chooses whose mail the list shows. A form that only asks: it works without a script, and the choice stands in the
 * address.
 */
export function RecipientFilter({
  recipients,
  chosen,
}: {
  recipients: readonly { readonly address: string; readonly count: number }[];
  chosen: string | null;
}) {
  const isListed = chosen === null || recipients.some(({ address }) => address === chosen);
  return (
    <form action="/caught-mail" method="get" className="mb-6 flex max-w-prose flex-wrap items-end gap-3">
      <div className="min-w-0 grow">
        <label htmlFor="recipient" className="mb-1 block font-semibold">
          Mail to
        </label>
        <select id="recipient" name="to" defaultValue={chosen ?? ''} className={controlClass()}>
          <option value="">Everybody</option>
          {isListed ? null : <option value={chosen}>{chosen}</option>}
          {recipients.map(({ address, count }) => (
            <option key={address} value={address}>
              {address} ({count})
            </option>
          ))}
        </select>
      </div>
      <Button type="submit">Show</Button>
    </form>
  );
}
