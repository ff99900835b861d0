import type { Page } from 'playwright-core';

interface WorkerScope {
  registration: { showNotification(title: string, options?: object): Promise<void> };
  shownTitles: string[];
}

/**
 * Writes down in the page's service worker what it has shown from now on. Asking the browser for its list instead
 * would disturb what is looked at: a list that is read while a notice is being shown makes Chromium forget that notice.
 * @returns the titles so far, each noted when the browser said that it is shown
 */
export async function watchNotices(page: Page): Promise<() => Promise<string[]>> {
  const context = page.context();
  // A page registers it only when it has something to show.
  const registered = context.serviceWorkers()[0] ?? context.waitForEvent('serviceworker');
  await page.evaluate(async () => {
    await navigator.serviceWorker.register('/sw.js');
    await navigator.serviceWorker.ready;
  });
  const worker = await registered;
  await worker.evaluate(() => {
    const scope = globalThis as unknown as WorkerScope;
    const show = scope.registration.showNotification.bind(scope.registration);
    scope.shownTitles = [];
    scope.registration.showNotification = async (title, options) => {
      await show(title, options);
      scope.shownTitles.push(title);
    };
  });
  return () => worker.evaluate(() => (globalThis as unknown as WorkerScope).shownTitles);
}
