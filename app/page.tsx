import { redirect } from 'next/navigation';
import { requireReader } from '@/lib/server/session';

/** The bare address: Today for who is signed in, the sign-in page for everybody else. */
export default async function HomePage() {
  await requireReader();
  redirect('/today');
}
