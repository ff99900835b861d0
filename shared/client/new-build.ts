/** Whether the server has a newer web app than the one that runs here, and how to change over to it. */

/** The entry scripts a page names. */
export const scriptsOf = (html: string): string[] =>
  [...html.matchAll(/<script[^>]+src="([^"]+)"/g)].map(([, address]) => address!).sort();

/** The scripts that the running page was loaded with. */
const runningScripts = (): string[] =>
  [...document.querySelectorAll<HTMLScriptElement>('script[src]')].map((script) => new URL(script.src).pathname);

/** Names the build that runs here, by its entry; '' where it has none (development, tests). */
export const runningBuild = (): string =>
  runningScripts().find((address) => /\/entry-[0-9a-f]{32}\.js$/.test(address)) ?? '';

/** Asks for the page itself and compares its scripts with the running ones; an unclear answer means no. */
export async function newBuildThere(): Promise<boolean> {
  try {
    const response = await fetch('/', { cache: 'no-store', headers: { accept: 'text/html' } });
    if (!response.ok) return false;
    const there = scriptsOf(await response.text());
    const running = runningScripts();
    return there.length > 0 && there.some((address) => !running.includes(address));
  } catch {
    return false;
  }
}

/** A worker that does not answer must not keep anybody from loading the page, ms. */
const takeOverMs = 3000;

/** Changes over to the new build: its worker takes over, then the page is loaded anew. What is typed is in the drafts. */
export async function takeNewBuild(): Promise<void> {
  const workers = 'serviceWorker' in navigator ? navigator.serviceWorker : null;
  const waiting = (await workers?.getRegistration().catch(() => undefined))?.waiting;
  if (workers && waiting) {
    const taken = new Promise((resolve) => workers.addEventListener('controllerchange', resolve, { once: true }));
    waiting.postMessage({ type: 'take-over' });
    await Promise.race([taken, new Promise((resolve) => setTimeout(resolve, takeOverMs))]);
  }
  location.reload();
}
