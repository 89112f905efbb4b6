import * as mariadb from 'mariadb';
import { setTimeout as pause } from 'node:timers/promises';
import { quantile } from './aims';

/** The statements of one request. */
export interface StatementCount {
  /** Every statement that reached the server (its counter Questions). */
  readonly statements: number;
  /** Those that read (its counter Com_select). */
  readonly selects: number;
}

const COUNTS = 5;
/** What follows the answer (the note that a session is in use) is over by then. */
const SETTLED_MS = 25;

/** Counts SQL statements by the server's own counters: the difference around one request, nothing else being at work. */
export class StatementCounter {
  readonly #connection: mariadb.Connection;

  private constructor(connection: mariadb.Connection) {
    this.#connection = connection;
  }

  static async open(url: string): Promise<StatementCounter> {
    return new StatementCounter(await mariadb.createConnection(url));
  }

  async #read(): Promise<StatementCount> {
    const rows = await this.#connection.query<{ Variable_name: string; Value: string }[]>(
      `SHOW GLOBAL STATUS WHERE Variable_name IN ('Questions', 'Com_select')`,
    );
    const of = (name: string) => Number(rows.find((row) => row.Variable_name === name)?.Value);
    return { statements: of('Questions'), selects: of('Com_select') };
  }

  /**
   * The statements of a request: the median of five, since once a minute a request also notes that its session is in
   * use. Connections are open already when the request was made before.
   */
  async of(request: () => Promise<unknown>): Promise<StatementCount> {
    const counts: StatementCount[] = [];
    for (let i = 0; i < COUNTS; i += 1) {
      const before = await this.#read();
      await request();
      await pause(SETTLED_MS);
      const after = await this.#read();
      counts.push({
        // The second reading counts itself.
        statements: after.statements - before.statements - 1,
        selects: after.selects - before.selects,
      });
    }
    const median = (pick: (count: StatementCount) => number) => quantile(counts.map(pick), 0.5);
    return { statements: median((each) => each.statements), selects: median((each) => each.selects) };
  }

  async version(): Promise<string> {
    const rows = await this.#connection.query<{ version: string }[]>('SELECT VERSION() AS version');
    return rows[0]?.version ?? '';
  }

  close(): Promise<void> {
    return this.#connection.end();
  }
}
