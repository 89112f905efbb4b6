import { Browser } from './browser';
import { PAGES, type BenchPage } from './pages';
import type { StatementCount, StatementCounter } from './statements';
import type { BenchTeam } from './team';

const WARM_UP = 10;
const ROUNDS = 4;
const REQUESTS_A_ROUND = 15;

/** A page at one size of the data: where it is, and what was measured. */
export interface Visit {
  readonly page: BenchPage;
  readonly address: string;
  readonly count: StatementCount;
  readonly samples: readonly number[];
}

export interface VisitedTrial {
  readonly code: string;
  readonly cohorts: number;
}

/** The browsers of everyone who looks, signed in, and the address of the bare page. */
export class Visitors {
  readonly #browsers = new Map<BenchPage['role'], Browser>();
  readonly bare: Browser;

  private constructor(bareUrl: string) {
    this.bare = new Browser(bareUrl);
  }

  static async signIn(url: string, bareUrl: string, team: BenchTeam): Promise<Visitors> {
    const visitors = new Visitors(bareUrl);
    for (const role of new Set(PAGES.map((page) => page.role))) {
      const browser = new Browser(url);
      if (role !== null) {
        const { email, password } = team.players[role];
        await browser.signIn(email, password);
      }
      visitors.#browsers.set(role, browser);
    }
    return visitors;
  }

  of(page: BenchPage): Browser {
    const browser = this.#browsers.get(page.role);
    if (!browser) throw new Error(`Nobody looks as ${page.role ?? 'a visitor'}.`);
    return browser;
  }

  close(): void {
    for (const browser of [this.bare, ...this.#browsers.values()]) browser.close();
  }
}

/** Measures pages: counts statements, then times requests one at a time. */
export class PageBench {
  readonly #visitors: Visitors;
  readonly #counter: StatementCounter;
  readonly #team: BenchTeam;
  /** Pages that could not be had, and why. */
  readonly failures = new Map<BenchPage, string>();

  constructor(visitors: Visitors, counter: StatementCounter, team: BenchTeam) {
    this.#visitors = visitors;
    this.#counter = counter;
    this.#team = team;
  }

  /** Warms every page up and counts its statements; leaves out what cannot be had. */
  async count(trial: VisitedTrial): Promise<Map<BenchPage, { address: string; count: StatementCount }>> {
    const counted = new Map<BenchPage, { address: string; count: StatementCount }>();
    for (const page of PAGES) {
      if (this.failures.has(page)) continue;
      const address = page.address(trial, this.#team);
      const browser = this.#visitors.of(page);
      try {
        await browser.page(address, 'identity');
        for (let i = 1; i < WARM_UP; i += 1) await browser.page(address);
        counted.set(page, { address, count: await this.#counter.of(() => browser.page(address)) });
      } catch (error) {
        const why = error instanceof Error ? error.message : String(error);
        this.failures.set(page, why);
        console.error(`${page.name} as ${page.role ?? 'a visitor'}: ${why}`);
      }
    }
    return counted;
  }

  /**
   * Times every page, one request at a time: some rounds over all pages, and in each round the bare page before every
   * page, so that whatever else the machine does meets both alike.
   */
  async visit(trial: VisitedTrial): Promise<{ visits: Visit[]; bare: number[] }> {
    const counted = await this.count(trial);
    const bare: number[] = [];
    const samples = new Map([...counted.keys()].map((page) => [page, [] as number[]]));
    for (let i = 0; i < 50; i += 1) await this.#visitors.bare.page('/');
    for (let round = 0; round < ROUNDS; round += 1) {
      for (const [page, { address }] of counted) {
        const browser = this.#visitors.of(page);
        for (let i = 0; i < REQUESTS_A_ROUND; i += 1) {
          bare.push((await this.#visitors.bare.page('/')).milliseconds);
          samples.get(page)?.push((await browser.page(address)).milliseconds);
        }
      }
    }
    const visits = [...counted].map(([page, found]) => ({
      page,
      ...found,
      samples: samples.get(page) ?? [],
    }));
    return { visits, bare };
  }
}
