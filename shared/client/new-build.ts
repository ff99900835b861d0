/** Whether the server has a newer web app than the one that runs here. */

/** The entry scripts a page names. */
export const scriptsOf = (html: string): string[] =>
  [...html.matchAll(/<script[^>]+src="([^"]+)"/g)].map(([, address]) => address!).sort();

/** Asks for the page itself and compares its scripts with the running ones; an unclear answer means no. */
export async function newBuildThere(): Promise<boolean> {
  try {
    const response = await fetch('/', { cache: 'no-store', headers: { accept: 'text/html' } });
    if (!response.ok) return false;
    const there = scriptsOf(await response.text());
    const running = [...document.querySelectorAll<HTMLScriptElement>('script[src]')].map(
      (script) => new URL(script.src).pathname,
    );
    return there.length > 0 && there.some((address) => !running.includes(address));
  } catch {
    return false;
  }
}
