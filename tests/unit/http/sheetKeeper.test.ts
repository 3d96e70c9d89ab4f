import { readFileSync } from 'node:fs';
import vm from 'node:vm';
import { beforeEach, describe, expect, it } from 'vitest';
import { forgetKept } from '~/server/http/keptSheets';

const ORIGIN = 'https://echotide.example';

/** The part of the Cache API that the keeper uses, in memory, in the order of insertion. */
class MemoryCache {
  readonly entries = new Map<string, Response>();
  readonly full = (name: string | Request) =>
    new URL(typeof name === 'string' ? name : name.url, ORIGIN).href;
  constructor(readonly fetch: (url: string) => Promise<Response>) {}
  match(name: string | Request) {
    return Promise.resolve(this.entries.get(this.full(name))?.clone());
  }
  put(name: string, response: Response) {
    this.entries.set(this.full(name), response);
    return Promise.resolve();
  }
  async add(name: string) {
    await this.put(name, await this.fetch(name));
  }
  delete(name: string | Request) {
    return Promise.resolve(this.entries.delete(this.full(name)));
  }
  keys() {
    return Promise.resolve([...this.entries.keys()].map((url) => ({ url })));
  }
}

type Handler = (event: Record<string, unknown>) => void;

/** The service worker in a world of its own. */
function keeperWorld() {
  const stores = new Map<string, MemoryCache>();
  const handlers = new Map<string, Handler>();
  const world = { answer: (_url: string): Response | null => null, asked: [] as string[] };
  const fetch = (request: string | Request) => {
    const url = typeof request === 'string' ? new URL(request, ORIGIN).href : request.url;
    world.asked.push(new URL(url).pathname);
    const answer = world.answer(url);
    return answer ? Promise.resolve(answer) : Promise.reject(new TypeError('offline'));
  };
  const caches = {
    open: (name: string) => {
      if (!stores.has(name)) stores.set(name, new MemoryCache(fetch));
      return Promise.resolve(stores.get(name)!);
    },
    delete: (name: string) => Promise.resolve(stores.delete(name)),
    keys: () => Promise.resolve([...stores.keys()]),
  };
  const self = {
    location: { origin: ORIGIN },
    addEventListener: (name: string, handler: Handler) => handlers.set(name, handler),
    skipWaiting: () => undefined,
    clients: { claim: () => Promise.resolve() },
  };
  vm.runInNewContext(readFileSync('public/skeds/keeper.js', 'utf8'), {
    self,
    caches,
    fetch,
    URL,
    Response,
    Headers,
    AbortSignal,
    Set,
    Array,
    JSON,
  });
  return {
    world,
    /** What the worker answers, or undefined where it leaves the request alone. */
    async request(path: string, mode = 'navigate', method = 'GET'): Promise<Response | undefined> {
      let answer: Promise<Response> | undefined;
      handlers.get('fetch')!({
        request: { url: ORIGIN + path, mode, method },
        respondWith: (given: Promise<Response>) => (answer = given),
      });
      return answer;
    },
    async keep(path: string, files: string[], fresh = true): Promise<boolean> {
      let kept = false;
      let done: Promise<unknown> = Promise.resolve();
      handlers.get('message')!({
        data: { keep: path, fresh, files },
        ports: [{ postMessage: (said: { kept: boolean }) => (kept = said.kept) }],
        waitUntil: (work: Promise<unknown>) => (done = work),
      });
      await done;
      return kept;
    },
    kept: () =>
      [...stores.values()]
        .flatMap((store) => [...store.entries.keys()])
        .map((url) => url.slice(ORIGIN.length))
        .filter((path) => !path.endsWith('?files'))
        .sort(),
  };
}

const page = (owner: string, text = 'the sheet') =>
  new Response(`<p class="notice" data-saved-copy hidden>Saved copy</p>${text}`, {
    headers: { 'x-sheet-owner': owner, 'content-type': 'text/html' },
  });

describe('the keeper of sheets', () => {
  let keeper: ReturnType<typeof keeperWorld>;
  beforeEach(() => {
    keeper = keeperWorld();
    keeper.world.answer = (url) => (url.includes('/_astro/') ? new Response('file') : page('a'));
  });

  it('answers from the server while there is one, and from what it kept without', async () => {
    await keeper.request('/skeds/1/sheet');
    expect(await (await keeper.request('/skeds/1/sheet'))!.text()).toContain('hidden');
    keeper.world.answer = () => null;
    const saved = await (await keeper.request('/skeds/1/sheet'))!.text();
    expect(saved).toContain('<p class="notice" data-saved-copy>Saved copy</p>');
    await expect(keeper.request('/skeds/2/sheet')).rejects.toThrow('offline');
  });

  it.each([502, 503, 504])('takes %s for no connection', async (status) => {
    await keeper.request('/skeds/1/sheet');
    keeper.world.answer = () => new Response('away', { status });
    expect(await (await keeper.request('/skeds/1/sheet'))!.text()).toContain('the sheet');
    expect((await keeper.request('/skeds/2/sheet'))!.status).toBe(status);
  });

  it.each([
    ['/skeds/1', 'navigate', 'GET'],
    ['/skeds/1/live', 'navigate', 'GET'],
    ['/skeds', 'navigate', 'GET'],
    ['/skeds/1/sheet', 'navigate', 'POST'],
    ['/skeds/1/sheet', 'cors', 'GET'],
    ['/api/v1/skeds', 'cors', 'GET'],
  ])('leaves %s (%s, %s) alone', async (path, mode, method) => {
    expect(await keeper.request(path, mode, method)).toBeUndefined();
    expect(keeper.kept()).toEqual([]);
  });

  it('keeps twelve sheets, those opened last, and only the files they need', async () => {
    for (let id = 1; id <= 14; id += 1) {
      await keeper.request(`/skeds/${id}/sheet`);
      await keeper.keep(`/skeds/${id}/sheet`, [
        `${ORIGIN}/_astro/all.css`,
        `${ORIGIN}/_astro/${id}.js`,
        `${ORIGIN}/favicon.svg`,
        'https://elsewhere.example/_astro/x.js',
      ]);
    }
    const kept = keeper.kept();
    expect(kept.filter((path) => path.startsWith('/skeds/'))).toHaveLength(12);
    expect(kept).not.toContain('/skeds/2/sheet');
    expect(kept).toContain('/skeds/3/sheet');
    expect(kept).not.toContain('/_astro/2.js');
    expect(kept).toContain('/_astro/3.js');
    expect(kept.every((path) => /^\/(skeds|_astro)\//.test(path))).toBe(true);
  });

  it('fetches the page itself when the page came before it, and what a form said is not kept', async () => {
    await keeper.request('/skeds/1/sheet?done=set');
    expect(keeper.kept()).toEqual([]);
    expect(await keeper.keep('/skeds/1/sheet', [], false)).toBe(true);
    expect(keeper.kept()).toEqual(['/skeds/1/sheet']);
  });

  it('forgets everything when another person’s sheet comes, or the sign-in', async () => {
    await keeper.request('/skeds/1/sheet');
    keeper.world.answer = () => page('b');
    await keeper.request('/skeds/2/sheet');
    expect(keeper.kept()).toEqual(['/skeds/2/sheet']);
    const redirect = { type: 'opaqueredirect', clone: () => redirect, headers: new Headers() };
    keeper.world.answer = () => redirect as unknown as Response;
    await keeper.request('/skeds/2/sheet');
    expect(keeper.kept()).toEqual([]);
  });

  it('forgets a sheet that is not this person’s any more', async () => {
    await keeper.request('/skeds/1/sheet');
    keeper.world.answer = () => new Response('none', { status: 404 });
    await keeper.request('/skeds/1/sheet');
    expect(keeper.kept()).toEqual([]);
  });

  it('keeps nothing of what does not say whose it is', async () => {
    keeper.world.answer = () => new Response('a page');
    await keeper.request('/skeds/1/sheet');
    expect(await keeper.keep('/skeds/1/sheet', [])).toBe(false);
    expect(await keeper.keep('/account', [], false)).toBe(false);
    expect(keeper.kept()).toEqual([]);
  });
});

describe('the server makes a browser forget', () => {
  const viewer = { id: 'p1', email: '', name: '', role: 'operator', timeZone: 'UTC' } as const;
  const asked = (cookie: string, who: typeof viewer | null) => {
    const headers = new Headers();
    forgetKept(new Request(ORIGIN, { headers: { cookie } }), headers, who);
    return headers.get('clear-site-data');
  };

  it('when nobody or somebody else is signed in, and only where something was kept', () => {
    expect(asked('', null)).toBeNull();
    expect(asked('theme=dark', viewer)).toBeNull();
    expect(asked('theme=dark; sheets_of=other', viewer)).toBe('"storage"');
    expect(asked('sheets_of=other', null)).toBe('"storage"');
  });
});
