import { once } from 'node:events';
import type http from 'node:http';
import net from 'node:net';
import { afterEach, describe, expect, it } from 'vitest';
import { createWebServer, drain, withoutSecrets } from '~/server/http/webServer';

let server: http.Server | undefined;
afterEach(() => {
  server?.closeAllConnections();
  server?.close();
});

async function serve(application: http.RequestListener, trustProxy = false): Promise<number> {
  server = createWebServer(application, { maxBodyBytes: 1000, trustProxy });
  server.listen(0, '127.0.0.1');
  await once(server, 'listening');
  return (server.address() as net.AddressInfo).port;
}

/** Answers with the length of the body once it is read. */
const measure: http.RequestListener = (request, response) => {
  let size = 0;
  request.on('data', (chunk: Buffer) => (size += chunk.length));
  request.on('end', () => response.end(String(size)));
};

async function post(port: number, body: string | ReadableStream) {
  const init = { method: 'POST', body, duplex: 'half' };
  const response = await fetch(`http://127.0.0.1:${port}/`, init);
  return { status: response.status, text: await response.text() };
}

describe('the limit on bodies', () => {
  it('lets through what fits, whole', async () => {
    const port = await serve(measure);
    expect(await post(port, 'x'.repeat(1000))).toEqual({ status: 200, text: '1000' });
    const chunks = new ReadableStream({
      start: (controller) => {
        for (let n = 0; n < 10; n += 1) controller.enqueue(new Uint8Array(100));
        controller.close();
      },
    });
    expect(await post(port, chunks)).toEqual({ status: 200, text: '1000' });
  });

  it('refuses a body that is announced too long without asking the application', async () => {
    let asked = false;
    const port = await serve(() => (asked = true));
    const { status, text } = await post(port, 'x'.repeat(1001));
    expect(status).toBe(413);
    expect(JSON.parse(text)).toMatchObject({ error: { code: 'bodyTooLarge', fields: [] } });
    expect(asked).toBe(false);
  });

  it('cuts off an endless body while it comes', async () => {
    let ended = false;
    let broken = false;
    const port = await serve((request, response) => {
      request.on('data', () => undefined);
      request.on('end', () => (ended = true));
      request.on('error', () => {
        broken = true;
        response.writeHead(500);
        response.end();
      });
    });
    const socket = net.connect(port, '127.0.0.1');
    socket.on('error', () => undefined);
    let answer = '';
    socket.on('data', (chunk) => (answer += chunk.toString()));
    socket.write('POST / HTTP/1.1\r\nHost: x\r\nTransfer-Encoding: chunked\r\n\r\n');
    const pump = setInterval(() => socket.write(`64\r\n${'x'.repeat(100)}\r\n`), 5);
    // The line may end by a reset while we still send; only the answer counts.
    await new Promise((resolve) => socket.once('close', resolve));
    clearInterval(pump);
    expect(answer).toMatch(/^HTTP\/1\.1 413 /);
    expect(answer).toContain('bodyTooLarge');
    expect(answer.match(/HTTP\/1\.1/g)).toHaveLength(1);
    await expect.poll(() => broken).toBe(true);
    expect(ended).toBe(false);
  });
});

describe('headers', () => {
  const echo: http.RequestListener = (request, response) => {
    response.end(JSON.stringify(request.headers));
  };
  const asked = {
    'x-forwarded-for': '203.0.113.9, 198.51.100.7',
    'x-forwarded-host': 'evil.example',
    'x-forwarded-proto': 'https',
    'x-request-id': 'chosen-by-the-visitor',
  };
  const ask = async (port: number) => {
    const response = await fetch(`http://127.0.0.1:${port}/`, { headers: asked });
    const headers = (await response.json()) as Record<string, string>;
    return { response, headers };
  };

  it('about forwarding are dropped unless a proxy is trusted', async () => {
    const { headers } = await ask(await serve(echo));
    expect(Object.keys(headers).filter((name) => name.startsWith('x-forwarded'))).toEqual([]);
  });

  it('name the address that the trusted proxy saw', async () => {
    const { headers } = await ask(await serve(echo, true));
    expect(headers['x-forwarded-for']).toBe('198.51.100.7');
    expect(headers['x-forwarded-proto']).toBe('https');
  });

  it('carry a request id of our own, the same in the answer', async () => {
    const { headers, response } = await ask(await serve(echo));
    expect(headers['x-request-id']).toMatch(/^[0-9a-f-]{36}$/);
    expect(response.headers.get('x-request-id')).toBe(headers['x-request-id']);
    expect(response.headers.get('x-content-type-options')).toBe('nosniff');
  });
});

describe('drain', () => {
  it('finishes what is under way, also on a kept-alive connection, and takes nothing new', async () => {
    const port = await serve((request, response) => {
      setTimeout(() => response.end(request.url), request.url === '/slow' ? 400 : 0);
    });
    await (await fetch(`http://127.0.0.1:${port}/first`)).text();
    const slow = fetch(`http://127.0.0.1:${port}/slow`).then((response) => response.text());
    await new Promise((resolve) => setTimeout(resolve, 150));
    // Far longer than this test may take: it ends by itself.
    const drained = drain(server!, 600_000);
    await expect(fetch(`http://127.0.0.1:${port}/late`)).rejects.toThrow();
    expect(await slow).toBe('/slow');
    await drained;
  });

  it('is not held up by a body that nobody reads', async () => {
    const port = await serve((request, response) => {
      request.once('readable', () => {
        request.pause();
        response.end('enough');
      });
      request.on('error', () => undefined);
    });
    const socket = net.connect(port, '127.0.0.1');
    socket.on('error', () => undefined);
    socket.write('POST / HTTP/1.1\r\nHost: x\r\nTransfer-Encoding: chunked\r\n\r\n64\r\n');
    socket.write('x'.repeat(100));
    await once(socket, 'data');
    // Far longer than this test may take: it ends by itself.
    await drain(server!, 600_000);
    socket.destroy();
  });

  it('cuts what takes too long', async () => {
    const port = await serve(() => undefined);
    const stuck = fetch(`http://127.0.0.1:${port}/`);
    await new Promise((resolve) => setTimeout(resolve, 100));
    await Promise.all([drain(server!, 200), expect(stuck).rejects.toThrow()]);
  });
});

describe('withoutSecrets', () => {
  it.each([
    ['/skeds?email=a@b.example', '/skeds'],
    ['/confirm/mJ0y8sJ3Vb0eE8q3zYq1QmJ0y8sJ3Vb0eE8q3zYq1Q', '/confirm/:id'],
    ['/skeds/5c8e0c4e-7d0f-4a34-9a7a-0123456789ab/move', '/skeds/:id/move'],
    ['/api/v1/moon', '/api/v1/moon'],
  ])('%s is logged as %s', (url, path) => {
    expect(withoutSecrets(url)).toBe(path);
  });
});
