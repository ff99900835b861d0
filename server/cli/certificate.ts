// `npm run certificate [-- names…]`: a certificate for https within the workshop, where there is no public name.
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { readConfig } from '../config';
import { makeLocalCertificate, validDays } from '../local-certificate';

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

main().catch((error: unknown) => {
  console.error(`bidewell: ${error instanceof Error ? error.message : String(error)}`);
  process.exitCode = 1;
});
