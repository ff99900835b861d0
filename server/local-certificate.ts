/** A certificate for https where there is no public name. No command of its own: what is bundled runs what it imports. */
import os from 'node:os';
import { generate } from 'selfsigned';

/** Browsers refuse a server's certificate that is valid for more than 398 days (common practice). */
export const validDays = 397;
const dayMs = 86_400_000;

export interface LocalCertificate {
  /** The server's certificate with its issuer, PEM. */
  chain: string;
  /** The server's private key, PEM. */
  key: string;
  /** The issuer, PEM: what phones and desks are told to trust. */
  issuer: string;
}

const isAddress = (name: string) => /^[\d.]+$/.test(name) || name.includes(':');

/**
 * Makes an issuer and a server's certificate signed by it. The issuer's key is thrown away at once, so that nothing
 * else can ever be signed in its name; a renewal therefore makes a new issuer.
 * @param names host names and addresses the server is reached by
 */
export async function makeLocalCertificate(names: string[], now: Date): Promise<LocalCertificate> {
  const common = {
    keyType: 'ec',
    algorithm: 'sha256',
    notBeforeDate: new Date(now.getTime() - dayMs),
    notAfterDate: new Date(now.getTime() + validDays * dayMs),
  } as const;
  const authority = await generate(
    [{ name: 'commonName', value: `Bidewell on ${os.hostname()} ${now.toISOString().slice(0, 10)}` }],
    {
      ...common,
      extensions: [
        { name: 'basicConstraints', cA: true, pathLenConstraint: 0, critical: true },
        { name: 'keyUsage', keyCertSign: true, critical: true },
      ],
    },
  );
  const server = await generate([{ name: 'commonName', value: names[0] ?? 'localhost' }], {
    ...common,
    ca: { key: authority.private, cert: authority.cert },
    extensions: [
      { name: 'basicConstraints', cA: false, critical: true },
      { name: 'keyUsage', digitalSignature: true, critical: true },
      { name: 'extKeyUsage', serverAuth: true },
      {
        name: 'subjectAltName',
        altNames: names.map((name) => (isAddress(name) ? { type: 7, ip: name } : { type: 2, value: name })),
      },
    ],
  });
  return { chain: `${server.cert.trim()}\n${authority.cert.trim()}\n`, key: server.private, issuer: authority.cert };
}
