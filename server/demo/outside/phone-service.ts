/** The push service of phones on this machine: tickets now, receipts when they are asked for. */
import http from 'node:http';
import type { AddressInfo } from 'node:net';
import zlib from 'node:zlib';
import { Agent, type Dispatcher } from 'undici';

export interface PhoneMessage {
  to: string;
  title: string;
  body: string;
  data: { id: string; turn: number; url: string };
  priority: string;
  collapseId: string;
  tag: string;
}

type Failure = { status: 'error'; message: string; details: { error: string } };

export interface FakePhoneService {
  taken: PhoneMessage[];
  /** Tokens that are refused at once. */
  unknown: Set<string>;
  /** Receipts by ticket; one that is not set here says that it arrived, `null` that it is not there yet. */
  receipts: Map<string, Failure | null>;
  /** Ticket of each message taken, in their order. */
  tickets: string[];
  /** HTTP statuses of the next answers in place of 200. */
  statuses: number[];
  /** Tickets that were asked for. */
  asked: string[][];
  /** For EXPO_BASE_URL of a server that is started. */
  url: string;
  /** Connections that end here wherever they were meant for. */
  dispatcher: Dispatcher;
  close(): Promise<void>;
}

export const unregistered: Failure = {
  status: 'error',
  message: 'The token is not registered any more.',
  details: { error: 'DeviceNotRegistered' },
};

/** @param taking called when a message was taken, before that is answered */
export async function startPhoneService(taking: (message: PhoneMessage) => void = () => {}): Promise<FakePhoneService> {
  const taken: PhoneMessage[] = [];
  const tickets: string[] = [];
  const unknown = new Set<string>();
  const receipts = new Map<string, Failure | null>();
  const statuses: number[] = [];
  const asked: string[][] = [];

  const answer = (path: string, body: unknown): unknown => {
    if (path.endsWith('/getReceipts')) {
      const { ids } = body as { ids: string[] };
      asked.push(ids);
      return Object.fromEntries(
        ids.flatMap((id) => {
          const receipt = receipts.get(id);
          return receipt === null ? [] : [[id, receipt ?? { status: 'ok' }]];
        }),
      );
    }
    return (body as PhoneMessage[]).map((message) => {
      if (unknown.has(message.to)) return unregistered;
      taken.push(message);
      const id = `ticket-${tickets.length + 1}`;
      tickets.push(id);
      taking(message);
      return { status: 'ok', id };
    });
  };

  const server = http.createServer((request, response) => {
    const chunks: Buffer[] = [];
    request.on('data', (chunk: Buffer) => chunks.push(chunk));
    request.on('end', () => {
      const status = statuses.shift();
      if (status !== undefined) return void response.writeHead(status).end('{"errors":[{"message":"not now"}]}');
      const raw = Buffer.concat(chunks);
      const text = request.headers['content-encoding'] === 'gzip' ? zlib.gunzipSync(raw) : raw;
      response.writeHead(200, { 'Content-Type': 'application/json' });
      response.end(JSON.stringify({ data: answer(request.url ?? '', JSON.parse(text.toString())) }));
    });
  });
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const url = `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
  const dispatcher = new Agent().compose(
    (dispatch) => (options, handler) => dispatch({ ...options, origin: url }, handler),
  );
  return {
    taken,
    tickets,
    unknown,
    receipts,
    statuses,
    asked,
    url,
    dispatcher,
    close: () => {
      server.closeAllConnections();
      return new Promise((resolve) => server.close(() => resolve()));
    },
  };
}
