// `npm run certificate [-- names…]`: a certificate for https within the workshop, where there is no public name.
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { pathToFileURL } from 'node:url';
import { generate } from 'selfsigned';
import { readConfig } from '../config';

/** Browsers refuse a server's certificate that is valid for more than 398 days (common practice). */
const validDays = 397;
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

/** What this machine is reached by: its name, localhost, and its addresses in the local network. */
function ownNames(): string[] {
  const addresses = Object.values(os.networkInterfaces())
    .flatMap((each) => each ?? [])
    .filter((each) => !each.address.startsWith('fe80'))
    .map((each) => each.address);
  return [...new Set(['localhost', os.hostname(), ...addresses, '127.0.0.1', '::1'])];
}

async function main(): Promise<void> {
  const { dataDir } = readConfig({ BIDEWELL_DATA: process.env.BIDEWELL_DATA });
  const names = [...new Set([...process.argv.slice(2), ...ownNames()])];
  const { chain, key, issuer } = await makeLocalCertificate(names, new Date());
  fs.mkdirSync(dataDir, { recursive: true });
  const files = {
    cert: path.join(dataDir, 'tls-cert.pem'),
    key: path.join(dataDir, 'tls-key.pem'),
    issuer: path.join(dataDir, 'tls-issuer.crt'),
  };
  fs.writeFileSync(files.cert, chain);
  fs.writeFileSync(files.key, key, { mode: 0o600 });
  fs.chmodSync(files.key, 0o600);
  fs.writeFileSync(files.issuer, issuer);
  console.log(`bidewell: a certificate for ${names.join(', ')}, valid ${validDays} days. Set and start again:`);
  console.log(`BIDEWELL_TLS_CERT=${files.cert}`);
  console.log(`BIDEWELL_TLS_KEY=${files.key}`);
  console.log(
    `bidewell: install ${files.issuer} as a trusted authority on each phone, desk and wall screen; without it the browser warns and keeps notifications off`,
  );
}

if (import.meta.url === pathToFileURL(process.argv[1] ?? '').href) {
  main().catch((error: unknown) => {
    console.error(`bidewell: ${error instanceof Error ? error.message : String(error)}`);
    process.exitCode = 1;
  });
}
