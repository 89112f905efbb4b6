/*
 * Measures an installation that runs: node --import tsx scripts/bench/measure.ts, with STEPWELL_BENCH as JSON (its addresses;
 * see the schema) and DATABASE_URL. Prints tables; started by scripts/bench/run.mjs. Ends with 1 when something could not be
 * measured, never for being slow.
 */
import { writeFileSync } from 'node:fs';
import os from 'node:os';
import { z } from 'zod';
import { closeDatabase } from '@/lib/db/connection';
import { timesOf } from './aims';
import { playUntilPacket } from './bench-trial';
import { Browser } from './browser';
import { type ClientScripts, ScriptScale } from './client-scripts';
import { benchDesign } from './design';
import type { BenchFigures, PageFigures } from './figures';
import { measureOutcomes } from './outcome-action';
import { PageBench, type Visit, Visitors } from './page-visits';
import type { BenchPage } from './pages';
import { printFigures } from './print-figures';
import { StatementCounter } from './statements';
import { benchTeam } from './team';
import { underLoad } from './under-load';

const settings = z
  .object({
    /** The project's folder, with the build that is served. */
    root: z.string(),
    /** Where the application and the bare page are served. */
    url: z.url(),
    bareUrl: z.url(),
    /** An account that may read the server's counters. */
    counterUrl: z.string(),
    /** Where the figures are written too. */
    jsonFile: z.string().nullable(),
  })
  .parse(JSON.parse(process.env.STEPWELL_BENCH ?? 'null'));

const COHORTS = { small: 5, large: 25 };
const PAGE_UNDER_LOAD = 'overview';

const say = (text: string) => console.error(text);

async function weighScripts(
  visitors: Visitors,
  visits: readonly Visit[],
): Promise<Map<BenchPage, ClientScripts>> {
  const weights = new Map<BenchPage, ClientScripts>();
  const stranger = new Browser(settings.url);
  const scale = new ScriptScale(stranger, settings.root);
  for (const { page, address } of visits) {
    const { body } = await visitors.of(page).page(address, 'identity');
    weights.set(page, await scale.weigh(body.toString(), page.route));
  }
  stranger.close();
  return weights;
}

async function measure(counter: StatementCounter): Promise<BenchFigures> {
  const loadBefore = os.loadavg()[0] ?? 0;
  const recommendations = benchDesign();

  const team = await benchTeam();
  const visitors = await Visitors.signIn(settings.url, settings.bareUrl, team);
  try {
    const bench = new PageBench(visitors, counter, team);
    const trialOf = async (cohorts: number) => {
      say(`Playing a trial of ${cohorts} cohorts …`);
      const { code } = await playUntilPacket(team, `BENCH-${cohorts}`, cohorts);
      say('Asking for the pages …');
      return { code, cohorts };
    };
    const smallTrial = await trialOf(COHORTS.small);
    const small = await bench.visit(smallTrial);
    const largeTrial = await trialOf(COHORTS.large);
    const large = await bench.visit(largeTrial);
    const weights = await weighScripts(visitors, large.visits);

    say('Asking by 16 connections at once …');
    const loaded = small.visits.find(({ page }) => page.name === PAGE_UNDER_LOAD);
    if (!loaded) throw new Error(`There is no page “${PAGE_UNDER_LOAD}”.`);
    const ofBare = await underLoad(settings.bareUrl, '');
    const ofPage = await underLoad(settings.url + loaded.address, visitors.of(loaded.page).cookie);

    say('Recording outcomes …');
    const outcomes = await measureOutcomes(team);
    const amongMany = await bench.count(largeTrial);
    const bareCount = await counter.of(() => visitors.bare.page('/'));

    const pages = large.visits.flatMap((visit): PageFigures[] => {
      const { page } = visit;
      const before = small.visits.find((each) => each.page === page);
      const after = amongMany.get(page);
      const scripts = weights.get(page);
      if (!before || !after || !scripts) return [];
      const figuresOf = ({ samples, count }: Visit) => ({ ...timesOf(samples), ...count });
      return [
        {
          name: page.name,
          role: page.role ?? '',
          hasCharts: page.hasCharts ?? false,
          small: figuresOf(before),
          large: figuresOf(visit),
          amongMany: after.count,
          scripts,
        },
      ];
    });
    return {
      measuredAt: new Date().toISOString(),
      machine: {
        processor: os.cpus()[0]?.model ?? 'unknown processor',
        cores: os.cpus().length,
        loadBefore,
        loadAfter: os.loadavg()[0] ?? 0,
        node: process.versions.node,
        mariadb: await counter.version(),
      },
      cohorts: COHORTS,
      recommendations,
      outcomes,
      bare: { ...timesOf([...small.bare, ...large.bare]), statements: bareCount.statements },
      pages,
      load: { page: PAGE_UNDER_LOAD, ofPage, ofBare },
      failures: [...bench.failures].map(
        ([page, why]) => `${page.name} as ${page.role ?? 'a visitor'}: ${why}`,
      ),
    };
  } finally {
    visitors.close();
  }
}

const counter = await StatementCounter.open(settings.counterUrl);
try {
  const figures = await measure(counter);
  printFigures(figures);
  if (settings.jsonFile !== null) writeFileSync(settings.jsonFile, `${JSON.stringify(figures, null, 2)}\n`);
  if (figures.failures.length > 0) process.exitCode = 1;
} finally {
  await counter.close();
  await closeDatabase();
}
