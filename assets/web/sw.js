// The service worker shows notifications and opens what they speak of. The app's own files are kept by sw-shell.js,
// which the build joins to this one; a number is never kept by either.
//
// Notice (from a push, or posted by a page as { type: 'notify', notice }):
//   { title, body, url, tag, id?, turn? }  url: address within this site; tag: one per cause, a later one replaces the
//   earlier. id and turn: of an alert; what is shown already with the same turn came twice, and makes no noise again.

/** The notice's address, kept within this site. */
function addressOf(url) {
  try {
    const address = new URL(url || '/', self.location.origin);
    return address.origin === self.location.origin ? address.href : self.location.origin + '/';
  } catch {
    return self.location.origin + '/';
  }
}

// One after the other: a list that is read while a notice is being shown makes Chromium forget that notice.
let showing = Promise.resolve();
function show(notice) {
  const next = () => put(notice);
  showing = showing.then(next, next);
  return showing;
}

/** Whether the alert is shown already, with the same turn: the server sends again what it does not know to have arrived. */
async function isShown({ id, tag, turn }) {
  if (!id || !tag || !self.registration.getNotifications) return false;
  const there = await self.registration.getNotifications({ tag });
  return there.some(({ data }) => Boolean(data) && data.turn === turn);
}

async function put(notice) {
  const again = await isShown(notice);
  return self.registration.showNotification(notice.title || 'Bidewell', {
    body: notice.body || '',
    tag: notice.tag,
    // A push must show something, also the second time: the same in its place, without a sound.
    renotify: Boolean(notice.tag) && !again,
    requireInteraction: true,
    icon: '/icon-192.png',
    badge: '/badge-96.png',
    data: { url: addressOf(notice.url), turn: notice.turn },
  });
}

async function open(url) {
  const all = await self.clients.matchAll({ type: 'window', includeUncontrolled: true });
  // A wall screen stays on its board.
  const windows = all.filter((client) => new URL(client.url).pathname !== '/wall');
  const there = windows.find((client) => client.url === url);
  if (there) return there.focus();
  if (windows.length > 0) {
    const shown = await windows[0].focus();
    // The page routes by itself and so keeps what was typed; a page without a listener is simply taken there.
    const answered = await ask(shown, { type: 'open', url });
    return answered ? shown : shown.navigate(url).catch(() => self.clients.openWindow(url));
  }
  return self.clients.openWindow(url);
}

/** Whether the page answers within a second. */
function ask(client, message) {
  return new Promise((resolve) => {
    const channel = new MessageChannel();
    const timer = setTimeout(() => resolve(false), 1000);
    channel.port1.onmessage = () => {
      clearTimeout(timer);
      resolve(true);
    };
    client.postMessage(message, [channel.port2]);
  });
}

// A new version waits until every page of the old one is closed, or until the person says 'reload' (below): a worker
// that takes over by itself would mix two versions on one screen.
self.addEventListener('activate', (event) => event.waitUntil(self.clients.claim()));

self.addEventListener('message', (event) => {
  const message = event.data || {};
  if (message.type === 'notify') event.waitUntil(show(message.notice || {}));
  if (message.type === 'take-over') event.waitUntil(self.skipWaiting());
});

self.addEventListener('push', (event) => {
  let notice = {};
  try {
    notice = event.data ? event.data.json() : {};
  } catch {
    notice = { body: event.data.text() };
  }
  event.waitUntil(show(notice));
});

self.addEventListener('notificationclick', (event) => {
  event.notification.close();
  event.waitUntil(open(addressOf(event.notification.data && event.notification.data.url)));
});
