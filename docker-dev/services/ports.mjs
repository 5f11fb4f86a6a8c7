import { createConnection, createServer } from 'node:net';

/** Whether something answers on a loopback port. */
export function isPortTaken(port) {
  return new Promise((resolve) => {
    const socket = createConnection({ port, host: '127.0.0.1' });
    socket.once('connect', () => {
      socket.destroy();
      resolve(true);
    });
    socket.once('error', () => resolve(false));
  });
}

/** @throws Error naming the variable that moves the port */
export async function requireFreePort(port, variable, purpose) {
  if (await isPortTaken(port)) {
    throw new Error(
      `Port ${port} (${purpose}) is taken by another program. Stop it (what a killed start left behind: npm run stop), or choose another port: ${variable}=NUMBER npm start`,
    );
  }
}

/** Ports that were free a moment ago, all different. */
export async function findFreePorts(count) {
  const servers = await Promise.all(
    Array.from(
      { length: count },
      () =>
        new Promise((resolve, reject) => {
          const server = createServer();
          server.once('error', reject);
          server.listen(0, '127.0.0.1', () => resolve(server));
        }),
    ),
  );
  const ports = servers.map((server) => server.address().port);
  await Promise.all(servers.map((server) => new Promise((resolve) => server.close(resolve))));
  return ports;
}
