import { PageLink } from '@/components/ui/page-link';
import { connection } from 'next/server';
import { PageTitle } from '@/components/layout/page-title';
import { Sheet } from '@/components/layout/sheet';

/** Shown for an address that does not exist, or that this person may not see: the two are not told apart. */
export default async function NotFound() {
  await connection();
  return (
    <Sheet>
      <PageTitle lede="There is nothing at this address, or it is not yours to see. Check the address, or ask the person who sent it to you.">
        Not found
      </PageTitle>
      <p>
        <PageLink href="/">Go to Today</PageLink>
      </p>
    </Sheet>
  );
}
