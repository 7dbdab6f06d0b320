/** Asking the system about TCP ports. */
import { createServer } from 'node:net';
import { Refusal } from './say.mjs';

/** True when this address and port can be listened on now. Throws a Refusal when the address is not ours. */
export function isPortFree(port, host = '127.0.0.1') {
  return new Promise((resolve, reject) => {
    const probe = createServer();
    probe.once('error', (error) => {
      if (error.code === 'EADDRINUSE') resolve(false);
      else if (error.code === 'EADDRNOTAVAIL')
        reject(
          new Refusal(
            `This machine has no address ${host}.`,
            'Set BIND to an address of this machine, or leave it out.',
          ),
        );
      else if (error.code === 'EACCES')
        reject(new Refusal(`This user may not listen on port ${port}.`, 'Choose a port of 1024 or more.'));
      else reject(error);
    });
    probe.listen({ port, host, exclusive: true }, () => probe.close(() => resolve(true)));
  });
}

/** A port the system says is free on loopback. */
export function freePort() {
  return new Promise((resolve, reject) => {
    const probe = createServer();
    probe.once('error', reject);
    probe.listen(0, '127.0.0.1', () => {
      const { port } = probe.address();
      probe.close(() => resolve(port));
    });
  });
}

/** Reads a port from the environment, or the default. */
export function portFrom(name, standard, env = process.env) {
  if (!env[name]) return standard;
  const port = Number(env[name]);
  if (Number.isInteger(port) && port >= 1 && port <= 65_535) return port;
  throw new Refusal(
    `${name} is “${env[name]}”, which is not a port.`,
    `Set ${name} to a whole number from 1 to 65535, or leave it out (${standard}).`,
  );
}

/** Refuses when the port is taken, and names the variable that moves it. */
export async function requirePort(variable, port, purpose, host) {
  if (await isPortFree(port, host)) return;
  throw new Refusal(
    `Port ${port}, which Saltmark needs for ${purpose}, is in use by another program.`,
    `Stop that program, or choose another port: ${variable}=${port + 100} npm start.`,
  );
}
