import { QueryTypes } from 'sequelize';
import { sequelize } from '@/lib/db/connection';
import { sqlTime } from './sql-time';

interface Failures {
  readonly count: number;
  readonly lastAt: number;
}

export interface SignInFailures {
  readonly pair: Failures;
  readonly address: Failures;
  readonly client: Failures;
  readonly clientIsKnown: boolean;
}

const DAY_MS = 86_400_000;
/** Failures longer ago than this no longer count, and a client is known this long. */
const FAILURES_COUNT_MS = DAY_MS;
const CLIENT_FAILURES_COUNT_MS = 3_600_000;
const KNOWN_CLIENT_MS = 30 * DAY_MS;

/**
 * The failed attempts that bear on the next one with an address from a client (lib/auth/back-off.ts).
 * @param emailDigest SHA-256 of the normalised address
 * @param now milliseconds since 1970
 */
export async function signInFailures(
  emailDigest: string,
  clientAddress: string,
  now: number,
): Promise<SignInFailures> {
  const rows: { kind: string; count: number | string; lastAt: Date | null }[] = await sequelize().query(
    `SELECT 'pair' AS kind, COUNT(*) AS count, MAX(attempted_at) AS lastAt FROM sign_in_attempts
       WHERE email_digest = :emailDigest AND client_address = :clientAddress AND NOT succeeded
         AND attempted_at > GREATEST(:since, COALESCE((SELECT MAX(attempted_at) FROM sign_in_attempts
           WHERE email_digest = :emailDigest AND client_address = :clientAddress AND succeeded), :since))
     UNION ALL
     SELECT 'address', COUNT(*), MAX(attempted_at) FROM sign_in_attempts
       WHERE email_digest = :emailDigest AND NOT succeeded
         AND attempted_at > GREATEST(:since, COALESCE((SELECT MAX(attempted_at) FROM sign_in_attempts
           WHERE email_digest = :emailDigest AND succeeded), :since))
     UNION ALL
     SELECT 'client', COUNT(*), MAX(attempted_at) FROM sign_in_attempts
       WHERE client_address = :clientAddress AND NOT succeeded AND attempted_at > :clientSince
     UNION ALL
     SELECT 'known', COUNT(*), NULL FROM sign_in_attempts
       WHERE email_digest = :emailDigest AND client_address = :clientAddress AND succeeded
         AND attempted_at > :knownSince`,
    {
      type: QueryTypes.SELECT,
      replacements: {
        emailDigest,
        clientAddress,
        since: sqlTime(now - FAILURES_COUNT_MS),
        clientSince: sqlTime(now - CLIENT_FAILURES_COUNT_MS),
        knownSince: sqlTime(now - KNOWN_CLIENT_MS),
      },
    },
  );
  const of = (kind: string): Failures => {
    const row = rows.find((candidate) => candidate.kind === kind);
    return { count: Number(row?.count ?? 0), lastAt: row?.lastAt?.getTime() ?? 0 };
  };
  return {
    pair: of('pair'),
    address: of('address'),
    client: of('client'),
    clientIsKnown: of('known').count > 0,
  };
}
