import * as mariadb from 'mariadb';
import { connection } from 'next/server';

const holder = globalThis as { barePool?: mariadb.Pool };

function pool(): mariadb.Pool {
  holder.barePool ??= mariadb.createPool(process.env.BARE_DATABASE_URL ?? '');
  return holder.barePool;
}

/** The floor that the pages are compared with: drawn anew at each request from one row, found by its key. */
export default async function BarePage() {
  await connection();
  const rows = await pool().query<{ kind: string }[]>('SELECT kind FROM installation WHERE id = ?', [1]);
  return (
    <main>
      <h1>A bare page</h1>
      <p>{rows[0]?.kind}</p>
    </main>
  );
}
