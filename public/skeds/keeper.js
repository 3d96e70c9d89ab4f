/*
 * Service worker: keeps sheets of skeds that were opened, with the files they are made of, for when there is no
 * connection. Nothing else is kept, and nothing else is answered from here.
 */
const SHEETS = 'sheets-1';
const FILES = 'sheet-files-1';
const MOST_SHEETS = 12;
const LONGEST_WAIT_MS = 10_000;
/** With the name of who may see what is kept. */
const OWNER = 'x-sheet-owner';
/** Answers of a proxy whose server is away. */
const AWAY = [502, 503, 504];

const isSheet = ({ origin, pathname }) =>
  origin === self.location.origin && /^\/skeds\/[^/]+\/sheet$/.test(pathname);
/** Named by a hash of what is in them, so a kept one is never out of date. */
const isFile = ({ origin, pathname }) =>
  origin === self.location.origin && pathname.startsWith('/_astro/');
/** Beside a sheet, the names of its files. */
const filesKey = (pathname) => `${pathname}?files`;

self.addEventListener('install', () => self.skipWaiting());
self.addEventListener('activate', (event) => event.waitUntil(takeOver()));
self.addEventListener('fetch', (event) => {
  const { request } = event;
  if (request.method !== 'GET') return;
  const url = new URL(request.url);
  if (request.mode === 'navigate' && isSheet(url)) event.respondWith(sheet(request, url));
  else if (isFile(url)) event.respondWith(file(request));
});
self.addEventListener('message', (event) => {
  const { keep, fresh, files } = event.data ?? {};
  const url = keep && new URL(keep, self.location.origin);
  if (!url || !isSheet(url) || !Array.isArray(files)) return;
  event.waitUntil(
    keepWithFiles(url, fresh === true, files).then(
      (kept) => event.ports[0]?.postMessage({ kept }),
      () => event.ports[0]?.postMessage({ kept: false }),
    ),
  );
});

async function takeOver() {
  for (const name of await caches.keys()) {
    if (name.startsWith('sheet') && name !== SHEETS && name !== FILES) await caches.delete(name);
  }
  await self.clients.claim();
}

/** The sheet from the server; without a connection the kept one, which says so. */
async function sheet(request, url) {
  const kept = await caches.open(SHEETS).then((cache) => cache.match(url.pathname));
  try {
    const answer = await fetch(
      request,
      kept ? { signal: AbortSignal.timeout(LONGEST_WAIT_MS) } : {},
    );
    if (kept && AWAY.includes(answer.status)) return await asSavedCopy(kept);
    await learn(answer.clone(), url);
    return answer;
  } catch (error) {
    if (!kept) throw error;
    return asSavedCopy(kept);
  }
}

async function file(request) {
  const kept = await caches.open(FILES).then((cache) => cache.match(request.url));
  return kept ?? fetch(request);
}

/** Keeps an answer to a sheet's address, or forgets what it shows to be no longer ours. */
async function learn(answer, { pathname, search }) {
  const owner = answer.headers.get(OWNER);
  // Sent on to the sign-in: nobody is signed in here any more.
  if (answer.type === 'opaqueredirect' || answer.redirected) return forgetAll();
  if (!owner) {
    if (answer.status === 404) await forget([pathname]);
    return;
  }
  const cache = await caches.open(SHEETS);
  for (const request of await cache.keys()) {
    const other = (await cache.match(request))?.headers.get(OWNER);
    if (other && other !== owner) {
      await forgetAll();
      break;
    }
  }
  // Behind a form the page says what has just been done; the plain one is asked for by its script.
  if (answer.ok && search === '') await put(pathname, answer);
}

async function put(pathname, answer) {
  const cache = await caches.open(SHEETS);
  // Taken out first, so that the order of the keys is that of the visits.
  await cache.delete(pathname);
  await cache.put(pathname, answer);
  const kept = (await cache.keys()).map(({ url }) => new URL(url)).filter(({ search }) => !search);
  await forget(kept.slice(0, -MOST_SHEETS).map((url) => url.pathname));
}

/** From the page itself: its files, and on a first visit the page, which came before this script. */
async function keepWithFiles(url, fresh, names) {
  if (!fresh) await learn(await fetch(url.pathname), { pathname: url.pathname, search: '' });
  const sheets = await caches.open(SHEETS);
  if (!(await sheets.match(url.pathname))) return false;
  const wanted = names.map((name) => new URL(name, self.location.origin)).filter(isFile);
  const files = await caches.open(FILES);
  for (const { href } of wanted) {
    if (!(await files.match(href))) await files.add(href);
  }
  const list = JSON.stringify(wanted.map(({ href }) => href));
  await sheets.put(filesKey(url.pathname), new Response(list));
  await forgetUnusedFiles();
  return true;
}

async function forget(pathnames) {
  const cache = await caches.open(SHEETS);
  for (const pathname of pathnames) {
    await cache.delete(pathname);
    await cache.delete(filesKey(pathname));
  }
  if (pathnames.length > 0) await forgetUnusedFiles();
}

async function forgetUnusedFiles() {
  const sheets = await caches.open(SHEETS);
  const used = new Set();
  for (const request of await sheets.keys()) {
    if (!request.url.endsWith('?files')) continue;
    for (const href of await (await sheets.match(request)).json()) used.add(href);
  }
  const files = await caches.open(FILES);
  for (const request of await files.keys()) {
    if (!used.has(request.url)) await files.delete(request);
  }
}

async function forgetAll() {
  await caches.delete(SHEETS);
  await caches.delete(FILES);
}

/** The kept page with the line that says what it is, which the page has with it, hidden. */
async function asSavedCopy(kept) {
  const html = await kept.text();
  const headers = new Headers(kept.headers);
  headers.delete('content-length');
  headers.delete('content-encoding');
  return new Response(
    html.replace(/(<p[^>]*\bdata-saved-copy\b[^>]*?)\shidden(?:="[^"]*")?/, '$1'),
    { status: kept.status, headers },
  );
}
