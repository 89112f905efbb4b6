import autocannon from 'autocannon';
import { timesOf, type Times } from './aims';

const CONNECTIONS = 16;
const SECONDS = 8;

/** A page asked for by 16 connections at once. */
export interface LoadFigures extends Times {
  readonly connections: number;
  readonly requestsPerSecond: number;
}

/**
 * Asks for one page by 16 connections for eight seconds, after two to warm up.
 * @throws Error when a request failed or was answered with another status than 2xx
 */
export async function underLoad(url: string, cookie: string): Promise<LoadFigures> {
  await hammer(url, cookie, 2);
  return hammer(url, cookie, SECONDS);
}

function hammer(url: string, cookie: string, duration: number): Promise<LoadFigures> {
  const samples: number[] = [];
  const headers = { accept: 'text/html', 'accept-encoding': 'gzip', ...(cookie ? { cookie } : {}) };
  return new Promise((resolve, reject) => {
    const run = autocannon({ url, connections: CONNECTIONS, duration, headers }, (error, result) => {
      if (error) return reject(error);
      if (result.errors > 0 || result.non2xx > 0) {
        return reject(
          new Error(`${url}: ${result.errors} errors, ${result.non2xx} other answers under load.`),
        );
      }
      resolve({
        connections: CONNECTIONS,
        requestsPerSecond: result.requests.average,
        ...timesOf(samples),
      });
    });
    run.on('response', (_client: unknown, _status: unknown, _bytes: unknown, milliseconds: number) =>
      samples.push(milliseconds),
    );
  });
}
