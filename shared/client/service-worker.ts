let registering: Promise<ServiceWorkerRegistration | null> | null = null;

/** The worker that shows notices, registered once and ready; null where the browser has none (plain http). */
export function serviceWorker(): Promise<ServiceWorkerRegistration | null> {
  if (!globalThis.isSecureContext || !('serviceWorker' in navigator)) return Promise.resolve(null);
  registering ??= navigator.serviceWorker
    .register('/sw.js')
    .then(() => navigator.serviceWorker.ready)
    .catch(() => {
      registering = null;
      return null;
    });
  return registering;
}
