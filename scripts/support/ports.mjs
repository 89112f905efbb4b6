import net from 'node:net';

function listen(port, host) {
  return new Promise((resolve, reject) => {
    const server = net.createServer();
    server.once('error', reject);
    server.listen({ port, host }, () => {
      const { port: taken } = server.address();
      server.close(() => resolve(taken));
    });
  });
}

/** A port of 127.0.0.1 that nothing listens on now. */
export function freePort() {
  return listen(0, '127.0.0.1');
}

/**
 * Why a port cannot be listened on: null when it can, else the system's code (EADDRINUSE, EACCES).
 * @param host the address to listen on; without it every address of the machine
 */
export async function portTrouble(port, host) {
  try {
    await listen(port, host);
    return null;
  } catch (error) {
    // A machine without IPv6 has no "every address" of that kind.
    if (error.code === 'EAFNOSUPPORT' && host === undefined) return portTrouble(port, '0.0.0.0');
    return error.code ?? 'unknown';
  }
}

/** Whether something answers on a port of 127.0.0.1 with a first byte of its own (a MariaDB greets). */
export function greets(port) {
  return new Promise((resolve) => {
    const socket = net.connect({ port, host: '127.0.0.1' });
    const done = (answer) => {
      socket.destroy();
      resolve(answer);
    };
    socket.setTimeout(2_000, () => done(false));
    socket.once('data', () => done(true));
    socket.once('error', () => done(false));
    socket.once('end', () => done(false));
  });
}
