// The shell of the app: its page, scripts, fonts and icons of one build, kept whole, so that the app opens without a
// connection. Numbers are never kept here: every call to the API goes to the server.
//
// The build lays this before sw.js, and `self.bidewellShell = { build, scripts, files }` before both. Where that is
// missing (development) nothing is kept.
(() => {
  const shell = self.bidewellShell;
  if (!shell) return;

  const prefix = 'bidewell-shell-';
  const name = prefix + shell.build;
  const kept = new Set(shell.files);
  /** A page that has not come by then is taken from here, ms. */
  const patience = 4000;
  /** Files fetched at a time: the page that is open has calls of its own to make. */
  const atOnce = 4;

  const isHashed = (file) => /[.-][0-9a-f]{32}\.[a-z0-9]+$/.test(file);

  async function fetched(file) {
    // A name that carries its hash is never another content: what the last build had is taken over.
    const before = isHashed(file) ? await caches.match(file, { ignoreVary: true }) : undefined;
    if (before) return before;
    const answer = await fetch(file, {
      cache: isHashed(file) ? 'default' : 'reload',
      headers: file === '/' ? { accept: 'text/html' } : {},
    });
    if (!answer.ok || answer.redirected) throw new Error(`${file} was answered with ${answer.status}`);
    if (file === '/') {
      const page = await answer.clone().text();
      // The server may already have another build: half of one and half of the other is kept by nobody.
      const missing = shell.scripts.find((script) => !page.includes(`"${script}"`));
      if (missing) throw new Error(`the page is of another build: it does not name ${missing}`);
    }
    return answer;
  }

  /** Keeps the whole build, or nothing of it. */
  async function lay() {
    const cache = await caches.open(name);
    const waiting = [...shell.files];
    const hand = async () => {
      for (let file = waiting.shift(); file !== undefined; file = waiting.shift()) {
        await cache.put(file, await fetched(file));
      }
    };
    try {
      await Promise.all(Array.from({ length: atOnce }, hand));
    } catch (error) {
      waiting.length = 0;
      await caches.delete(name);
      throw error;
    }
  }

  async function dropOthers() {
    const names = await caches.keys();
    await Promise.all(names.filter((one) => one.startsWith(prefix) && one !== name).map((one) => caches.delete(one)));
  }

  const from = async (file) => (await caches.open(name)).match(file, { ignoreVary: true });

  /** The server's page; the kept one where the server is not reached, stumbles, or takes too long. */
  async function page(request) {
    let timer;
    const late = new Promise((_, reject) => {
      timer = setTimeout(() => reject(new Error('late')), patience);
    });
    try {
      const answer = await Promise.race([fetch(request), late]);
      return answer.status < 500 ? answer : ((await from('/')) ?? answer);
    } catch (error) {
      const own = await from('/');
      if (own) return own;
      throw error;
    } finally {
      clearTimeout(timer);
    }
  }

  /** Screens are addresses without a file's ending; what the server answers itself is none of them. */
  const isScreen = (path) =>
    !/^\/(api|_expo|assets|socket\.io|healthz|readyz|metrics)(\/|$)/.test(path) && !/\.[^/]*$/.test(path);

  function pathOf(url) {
    const address = new URL(url);
    if (address.origin !== self.location.origin) return null;
    try {
      return decodeURIComponent(address.pathname);
    } catch {
      return null;
    }
  }

  /** A page that was loaded as this build already asks for it: nobody else's page may lose its files over that. */
  async function takeOverWhereAlone() {
    const pages = await self.clients.matchAll({ type: 'window', includeUncontrolled: true });
    if (pages.length <= 1) await self.skipWaiting();
  }

  self.addEventListener('message', (event) => {
    if (event.data && event.data.type === 'take-over-alone') event.waitUntil(takeOverWhereAlone());
  });
  self.addEventListener('install', (event) => event.waitUntil(lay()));
  self.addEventListener('activate', (event) => event.waitUntil(dropOthers()));
  self.addEventListener('fetch', (event) => {
    const { request } = event;
    const path = request.method === 'GET' ? pathOf(request.url) : null;
    if (path === null) return;
    if (request.mode === 'navigate') {
      if (isScreen(path)) event.respondWith(page(request));
      return;
    }
    if (path !== '/' && kept.has(path)) {
      event.respondWith(from(path).then((own) => own ?? fetch(request)));
    }
  });
})();
