import { once } from 'node:events';
import net from 'node:net';

/** Ports that nobody holds; all held at once, so that they differ, and let go just before they are used. */
export async function freePorts(count: number): Promise<number[]> {
  const holders = await Promise.all(
    Array.from({ length: count }, async () => {
      const holder = net.createServer().listen(0, '127.0.0.1');
      await once(holder, 'listening');
      return holder;
    }),
  );
  const ports = holders.map((holder) => (holder.address() as net.AddressInfo).port);
  await Promise.all(holders.map((holder) => once(holder.close(), 'close')));
  return ports;
}
