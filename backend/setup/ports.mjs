import { createServer } from 'node:net';

function listenOnce(port, host) {
  return new Promise((resolve, reject) => {
    const server = createServer();
    server.once('error', reject);
    server.listen({ port, host, exclusive: true }, () => {
      const { port: taken } = server.address();
      server.close(() => resolve(taken));
    });
  });
}

/** A port nobody listens on at this moment, chosen by the system. */
export function anyFreePort(host = '127.0.0.1') {
  return listenOnce(0, host);
}

/** `wanted` if it is free, else the next free one above it. */
export async function freePortFrom(wanted, host = '127.0.0.1') {
  for (let port = wanted; port < wanted + 200 && port <= 65535; port += 1) {
    try {
      return await listenOnce(port, host);
    } catch (error) {
      // Low ports need a privilege: trying the next one would only be refused in the same way.
      if (error.code !== 'EADDRINUSE') throw error;
    }
  }
  return anyFreePort(host);
}
