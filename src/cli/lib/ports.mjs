import net from 'node:net';
import { Problem } from './problem.mjs';

/** The port named in the environment, or the usual one. */
export function portFrom(name, usual) {
  const text = process.env[name];
  if (text === undefined || text === '') return usual;
  const port = Number(text);
  if (!Number.isInteger(port) || port < 1 || port > 65_535) {
    throw new Problem(`${name} is "${text}", which is not a port (1 to 65535).`);
  }
  return port;
}

/** Refuses ports that another program holds, naming the setting that chooses another one. */
export async function requireFreePorts(wanted) {
  const seen = new Map();
  for (const { name, port, host } of wanted) {
    if (seen.has(port)) throw new Problem(`${seen.get(port)} and ${name} are both ${port}.`);
    seen.set(port, name);
    const code = await tryPort(port, host);
    if (code === 'EADDRINUSE') {
      throw new Problem(
        `Port ${port} is taken by another program: stop it, or choose another port with ${name}.`,
      );
    }
    if (code) throw new Problem(`Port ${port} (${name}) cannot be used on ${host} (${code}).`);
  }
}

function tryPort(port, host) {
  return new Promise((resolve) => {
    const server = net.createServer();
    server.once('error', (error) => resolve(error.code ?? 'unknown'));
    server.listen({ port, host, exclusive: true }, () => server.close(() => resolve(undefined)));
  });
}
