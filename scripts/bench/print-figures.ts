import { AIMS, inWords, printTable, type Times } from './aims';
import type { BenchFigures, PageFigures } from './figures';

const ms = (value: number): string => value.toFixed(1);
const kB = (bytes: number): string => (bytes / 1000).toFixed(1);

function printOutcomes({ outcomes }: BenchFigures): void {
  console.log('\nRecording an outcome: the command with its transaction, milliseconds');
  const row = (what: string, times: Times) => [what, ms(times.p50), ms(times.p95), String(times.samples)];
  printTable(
    ['what', 'p50', 'p95', 'samples'],
    [
      row('an outcome, the cohort goes on', outcomes.recorded),
      row('the last one, with recommendation', outcomes.completing),
    ],
  );
}

function printTimes({ pages, bare, cohorts }: BenchFigures): void {
  console.log(
    `\nServer time of a page, one request at a time, milliseconds; in a trial of ${cohorts.small} and of ${cohorts.large} cohorts; ` +
      `× is p95 over the bare page’s, aim at most ${AIMS.ratio}`,
  );
  const ratio = (times: Times) => times.p95 / bare.p95;
  printTable(
    ['page', 'as', 'p50', 'p95', '×', '', 'p50 large', 'p95 large', '× large', ''],
    [
      ['bare page', '', ms(bare.p50), ms(bare.p95), '1.0', '', '', '', '', ''],
      ...pages.map(({ name, role, small, large }) => [
        name,
        role,
        ms(small.p50),
        ms(small.p95),
        ratio(small).toFixed(1),
        inWords(ratio(small) <= AIMS.ratio),
        ms(large.p50),
        ms(large.p95),
        ratio(large).toFixed(1),
        inWords(ratio(large) <= AIMS.ratio),
      ]),
    ],
  );
}

function isWithinStatements({ small, large, amongMany }: PageFigures): boolean {
  const counts = [small, large, amongMany].map((count) => count.statements);
  return Math.max(...counts) <= AIMS.statements && new Set(counts).size === 1;
}

function printStatementsAndScripts({ pages, cohorts }: BenchFigures): void {
  console.log(
    `\nSQL statements of a page (${cohorts.small} cohorts / ${cohorts.large} cohorts / ten trials more; aim at most ${AIMS.statements}, the same everywhere), ` +
      `and the scripts it loads, kB gzip (aim below ${AIMS.scriptKilobytes} without charts)`,
  );
  printTable(
    ['page', 'as', 'statements', '', 'files', 'kB', '', 'kB later'],
    pages.map((page) => {
      const { name, role, small, large, amongMany, scripts, hasCharts } = page;
      return [
        name,
        role,
        `${small.statements} / ${large.statements} / ${amongMany.statements}`,
        inWords(isWithinStatements(page)),
        String(scripts.files),
        kB(scripts.bytes),
        hasCharts ? 'has charts' : inWords(scripts.bytes < AIMS.scriptKilobytes * 1000),
        scripts.laterBytes > 0 ? kB(scripts.laterBytes) : '',
      ];
    }),
  );
}

function printLoad({ load }: BenchFigures): void {
  const { ofPage, ofBare, page } = load;
  console.log(`\n${ofPage.connections} connections at once, milliseconds`);
  const row = (name: string, times: typeof ofPage) => [
    name,
    ms(times.p50),
    ms(times.p95),
    ms(times.requestsPerSecond),
    (times.p95 / ofBare.p95).toFixed(1),
    inWords(times.p95 <= AIMS.ratio * ofBare.p95),
  ];
  printTable(['page', 'p50', 'p95', 'requests/s', '×', ''], [row('bare page', ofBare), row(page, ofPage)]);
}

/** Prints what was measured, each figure beside its aim. The table of recommendations prints itself. */
export function printFigures(figures: BenchFigures): void {
  const { machine, recommendations } = figures;
  const slowest = Math.max(...recommendations.map((row) => row.recommendMedian));
  console.log(
    `Slowest recommendation ${slowest.toFixed(3)} ms (median), aim below ${AIMS.recommendationMilliseconds} ms: ` +
      inWords(slowest < AIMS.recommendationMilliseconds),
  );
  printOutcomes(figures);
  printTimes(figures);
  printStatementsAndScripts(figures);
  printLoad(figures);
  console.log(
    `\n${machine.processor}, ${machine.cores} cores (load ${machine.loadBefore.toFixed(1)} before, ` +
      `${machine.loadAfter.toFixed(1)} after), Node.js ${machine.node}, MariaDB ${machine.mariadb}`,
  );
  for (const failure of figures.failures) console.log(`Not measured: ${failure}`);
}
