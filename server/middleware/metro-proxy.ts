import type { RequestHandler } from 'express';
import http from 'node:http';
import net from 'node:net';

/**
 * Development only: hands every request that is not the API's to the Expo server on this machine, so that the page,
 * the API and the sockets share one address as they do in production.
 * @param port where `expo start` listens
 */
export function metroProxy(port: number): RequestHandler {
  return (request, response) => {
    const onward = http.request(
      {
        host: '127.0.0.1',
        port,
        method: request.method,
        path: request.originalUrl,
        headers: { ...request.headers, host: `localhost:${port}` },
      },
      (answer) => {
        response.writeHead(answer.statusCode ?? 502, answer.headers);
        answer.pipe(response);
      },
    );
    onward.on('error', () => {
      if (!response.headersSent)
        response.status(502).type('text').send('The Expo server is not up yet. Load the page again in a moment.');
    });
    request.pipe(onward);
  };
}

/**
 * Development only: hands Metro's own web sockets (reload, messages) on; those of the live board stay here.
 * The socket server beside it must be made with `destroyUpgrade: false`.
 * @param livePath path of our own socket server, such as '/socket.io'
 */
export function proxyMetroUpgrades(server: http.Server, port: number, livePath = '/socket.io'): void {
  server.on('upgrade', (request, socket, head) => {
    if (request.url?.startsWith(livePath)) return;
    const onward = net.connect(port, '127.0.0.1', () => {
      const headers = { ...request.headers, host: `localhost:${port}`, origin: `http://localhost:${port}` };
      const lines = Object.entries(headers).map(([name, value]) => `${name}: ${String(value)}`);
      onward.write(`${request.method} ${request.url} HTTP/1.1\r\n${lines.join('\r\n')}\r\n\r\n`);
      onward.write(head);
      socket.pipe(onward).pipe(socket);
    });
    onward.on('error', () => socket.destroy());
    socket.on('error', () => onward.destroy());
  });
}
