/** MariaDB's error numbers after which the same transaction may succeed when it is run again. */
const RUN_AGAIN = new Set([
  1213, // deadlock, and a conflict at the commit of a cluster
  1205, // lock wait timeout
]);

/** Error numbers and codes that say the connection, or its node, is gone. */
const LOST_NUMBERS = new Set([
  1047, // a cluster node that is not ready
  1053, // server shutdown in progress
  1927, // connection was killed
  2006, // server has gone away
  2013, // lost connection during query
  45001, // the connector's own: connection already closed,
  45004, // … destroyed before the command ran,
  45009, // … socket closed unexpectedly,
  45012, // … connection timeout,
  45013, // … command on a closed connection,
  45026, // … socket timeout
]);
const LOST_CODES = new Set([
  'ECONNREFUSED',
  'ECONNRESET',
  'EPIPE',
  'ETIMEDOUT',
  'EHOSTUNREACH',
  'ENETUNREACH',
]);

function* chain(error: unknown): Generator<object> {
  let current = error;
  for (let depth = 0; depth < 6 && typeof current === 'object' && current !== null; depth += 1) {
    yield current;
    current =
      'parent' in current && current.parent ? current.parent : 'cause' in current ? current.cause : null;
  }
}

function carries(error: unknown, numbers: ReadonlySet<number>, codes?: ReadonlySet<string>): boolean {
  for (const link of chain(error)) {
    if ('errno' in link && typeof link.errno === 'number' && numbers.has(link.errno)) return true;
    if (codes && 'code' in link && typeof link.code === 'string' && codes.has(link.code)) return true;
  }
  return false;
}

/** Whether the database asks to run the transaction again (1213, 1205); nothing of it was kept. */
export function isConflict(error: unknown): boolean {
  return carries(error, RUN_AGAIN);
}

/** Whether the connection to the database, or its node, was lost. */
export function isLostConnection(error: unknown): boolean {
  return carries(error, LOST_NUMBERS, LOST_CODES);
}
