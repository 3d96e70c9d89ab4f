import { once } from 'node:events';
import net from 'node:net';

/** What the fake does at one point of the conversation: an answer, silence, or a cut line. */
export type Move = (string & {}) | 'hang' | 'drop';

export const STAGES = ['greeting', 'hello', 'mail', 'rcpt', 'data', 'message'] as const;
export type Stage = (typeof STAGES)[number];

/** Moves by stage; `message` comes after the whole message. What is not named is answered well. */
export type Script = Partial<Record<Stage, Move>> & {
  /** Runs before the answer to the message: the server now has the mail. */
  taken?: (source: string) => void;
  /** Runs before each answer, with what was asked. */
  at?: (stage: Stage, asked: string) => void;
  /** Runs after each answer was written. */
  answered?: (stage: Stage) => void;
  /** Runs when the client says that it is done, which it does after it heard the last answer. */
  quit?: () => void;
  /** The line is cut after the answer at this stage was sent. */
  cutAfter?: Stage;
};

export interface SmtpFake {
  port: number;
  /** Messages that came whole, whatever was answered. */
  received: string[];
  connections: () => number;
  /** Nobody listens and every line is cut, until `open`. */
  close: () => Promise<void>;
  open: () => Promise<void>;
  stop: () => Promise<void>;
}

const WELL: Record<Stage, string> = {
  greeting: '220 fake.example ESMTP',
  hello: '250 fake.example',
  mail: '250 2.1.0 ok',
  rcpt: '250 2.1.5 ok',
  data: '354 go on',
  message: '250 2.0.0 taken',
};
const VERBS: Record<string, Stage> = {
  EHLO: 'hello',
  HELO: 'hello',
  MAIL: 'mail',
  RCPT: 'rcpt',
  DATA: 'data',
};

/** A mail server of a few lines that misbehaves as told; `scriptFor` is asked at each connection (from 1). */
export async function startSmtpFake(
  scriptFor: (connection: number) => Script,
  wishedPort = 0,
): Promise<SmtpFake> {
  const received: string[] = [];
  const lines = new Set<net.Socket>();
  let count = 0;
  const server = net.createServer((socket) => {
    count += 1;
    lines.add(socket);
    socket.on('close', () => lines.delete(socket));
    socket.on('error', () => undefined);
    converse(socket, scriptFor(count), received);
  });
  let port = wishedPort;
  const open = async () => {
    server.listen(port, '127.0.0.1');
    await once(server, 'listening');
    port = (server.address() as net.AddressInfo).port;
  };
  const close = async () => {
    for (const socket of lines) socket.destroy();
    if (!server.listening) return;
    server.close();
    await once(server, 'close');
  };
  await open();
  return { port, received, connections: () => count, close, open, stop: close };
}

function converse(socket: net.Socket, script: Script, received: string[]): void {
  let pending = '';
  let inMessage = false;
  const answer = (stage: Stage, asked: string) => {
    script.at?.(stage, asked);
    const move = script[stage] ?? WELL[stage];
    if (move === 'drop') socket.destroy();
    else if (move !== 'hang') {
      socket.write(`${move}\r\n`, () => {
        script.answered?.(stage);
        if (script.cutAfter === stage) socket.destroy();
      });
    }
    return move;
  };
  answer('greeting', '');
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
        answer('message', unit);
        continue;
      }
      const stage = VERBS[unit.slice(0, 4).toUpperCase()];
      if (stage) inMessage = answer(stage, unit).startsWith('354');
      else if (/^QUIT/i.test(unit)) {
        script.quit?.();
        socket.end('221 2.0.0 bye\r\n');
      } else socket.write('250 ok\r\n');
    }
  });
}
