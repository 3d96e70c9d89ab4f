import { once } from 'node:events';
import net from 'node:net';

/** What the fake does at one point of the conversation: an answer, silence, or a cut line. */
export type Move = (string & {}) | 'hang' | 'drop';

export interface Script {
  greeting?: Move;
  mail?: Move;
  rcpt?: Move;
  /** After the whole message came. `taken` runs before the answer: the server now has the mail. */
  message?: Move;
  taken?: (source: string) => void;
}

export interface SmtpFake {
  port: number;
  /** Messages that came whole, whatever was answered. */
  received: string[];
  connections: () => number;
  stop: () => Promise<void>;
}

/** A mail server of a few lines that misbehaves as told; `scriptFor` is asked at each connection (from 1). */
export async function startSmtpFake(scriptFor: (connection: number) => Script): Promise<SmtpFake> {
  const received: string[] = [];
  const open = new Set<net.Socket>();
  let count = 0;
  const server = net.createServer((socket) => {
    count += 1;
    open.add(socket);
    socket.on('close', () => open.delete(socket));
    socket.on('error', () => undefined);
    converse(socket, scriptFor(count), received);
  });
  server.listen(0, '127.0.0.1');
  await once(server, 'listening');
  return {
    port: (server.address() as net.AddressInfo).port,
    received,
    connections: () => count,
    stop: async () => {
      for (const socket of open) socket.destroy();
      server.close();
      await once(server, 'close');
    },
  };
}

function converse(socket: net.Socket, script: Script, received: string[]): void {
  let pending = '';
  let inMessage = false;
  const make = (move: Move) => {
    if (move === 'drop') socket.destroy();
    else if (move !== 'hang') socket.write(`${move}\r\n`);
  };
  make(script.greeting ?? '220 fake.example ESMTP');
  socket.on('data', (chunk) => {
    pending += chunk.toString('latin1');
    for (;;) {
      const end = pending.indexOf(inMessage ? '\r\n.\r\n' : '\r\n');
      if (end < 0) return;
      const unit = pending.slice(0, end);
      pending = pending.slice(end + (inMessage ? 5 : 2));
      if (inMessage) {
        inMessage = false;
        received.push(unit);
        script.taken?.(unit);
        make(script.message ?? '250 2.0.0 taken');
      } else {
        const verb = unit.slice(0, 4).toUpperCase();
        if (verb === 'EHLO' || verb === 'HELO') make('250 fake.example');
        else if (verb === 'MAIL') make(script.mail ?? '250 2.1.0 ok');
        else if (verb === 'RCPT') make(script.rcpt ?? '250 2.1.5 ok');
        else if (verb === 'QUIT') socket.end('221 2.0.0 bye\r\n');
        else if (verb === 'DATA') {
          inMessage = true;
          make('354 go on');
        } else make('250 ok');
      }
    }
  });
}
