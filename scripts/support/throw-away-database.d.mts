/** Port and password of the accounts stepwell_test_admin and stepwell_test_app of a throw-away MariaDB. */
export interface ThrowAwayDatabase {
  readonly port: number;
  readonly password: string;
  readonly pid: number;
  stop(): Promise<void>;
}
export function startThrowAwayDatabase(root: string): Promise<ThrowAwayDatabase>;
