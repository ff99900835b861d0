import { X509Certificate } from 'node:crypto';
import https from 'node:https';
import type { AddressInfo } from 'node:net';
import { expect, test } from 'vitest';
import { makeLocalCertificate } from '@/server/local-certificate';

/** The status a client gets that trusts nothing but the issuer. */
function get(port: number, host: string, ca: string): Promise<number | undefined> {
  return new Promise((resolve, reject) => {
    https.get({ port, host, ca }, (answer) => resolve(answer.resume().statusCode)).on('error', reject);
  });
}

test('a client that trusts the issuer connects by name and by address, and one that trusts another issuer does not', async () => {
  const now = new Date();
  const made = await makeLocalCertificate(['localhost', '127.0.0.1'], now);
  const other = await makeLocalCertificate(['localhost'], now);
  const server = https.createServer({ cert: made.chain, key: made.key }, (_request, response) => response.end('ok'));
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const { port } = server.address() as AddressInfo;
  try {
    expect(await get(port, 'localhost', made.issuer)).toBe(200);
    expect(await get(port, '127.0.0.1', made.issuer)).toBe(200);
    await expect(get(port, 'localhost', other.issuer)).rejects.toThrow();
  } finally {
    server.close();
  }
});

test('the certificate names every host, lasts at most 398 days, and cannot sign others', async () => {
  const { chain } = await makeLocalCertificate(
    ['bench.example.com', '192.0.2.7', '2001:db8::7'],
    new Date('2026-06-09T08:00:00Z'),
  );
  const certificate = new X509Certificate(chain);
  expect(certificate.checkHost('bench.example.com')).toBe('bench.example.com');
  expect(certificate.checkIP('192.0.2.7')).toBe('192.0.2.7');
  expect(certificate.checkIP('2001:db8::7')).toBe('2001:db8::7');
  expect(certificate.ca).toBe(false);
  const days = (Date.parse(certificate.validTo) - Date.parse(certificate.validFrom)) / 86_400_000;
  expect(days).toBeLessThanOrEqual(398);
});
