/** The yardstick: a web socket server that sends one text to all who are connected, and does nothing else. */
import { createRequire } from 'node:module';
import type { AddressInfo } from 'node:net';
import type { WebSocketServer } from 'ws';
import { answerQuestions, preciseNow } from './processes';

// The very `ws` that the server's own sockets stand on.
const requireFrom = createRequire(createRequire(import.meta.url).resolve('engine.io'));
const { WebSocketServer: Bare } = requireFrom('ws') as { WebSocketServer: typeof WebSocketServer };
const server = new Bare({ port: 0, host: '127.0.0.1', perMessageDeflate: false });
await new Promise((resolve) => server.once('listening', resolve));

answerQuestions({
  port: () => (server.address() as AddressInfo).port,
  /** @returns when it began to send, epoch ms */
  broadcast: (text: string) => {
    const at = preciseNow();
    for (const client of server.clients) client.send(text);
    return at;
  },
});
