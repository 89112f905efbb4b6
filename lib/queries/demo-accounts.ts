import { QueryTypes } from 'sequelize';
import { sequelize } from '@/lib/db/connection';

/** An account of the demonstration: its password is no secret. */
export interface DemoAccountEntry {
  readonly email: string;
  readonly password: string;
  readonly printedName: string;
  readonly description: string;
}

/** The accounts that the sign-in page lists: those of the demo data, and never in a production installation. */
export function demoAccounts(): Promise<DemoAccountEntry[]> {
  return sequelize().query<DemoAccountEntry>(
    `SELECT p.email, d.password, p.printed_name AS printedName, d.description
     FROM demo_accounts d
     JOIN people p ON p.id = d.person_id AND p.state = 'active'
     JOIN installation i ON i.id = 1 AND i.kind <> 'production'
     ORDER BY d.position`,
    { type: QueryTypes.SELECT },
  );
}
