/** Addresses of push services come from browsers, so from outside: none may lead into the server's own network. */
import dns from 'node:dns';
import https from 'node:https';
import net from 'node:net';

const inside = new net.BlockList();
// RFC 6890: what is not reachable from the internet. IPv4 within IPv6 is looked at as IPv4.
for (const [address, prefix] of [
  ['0.0.0.0', 8],
  ['10.0.0.0', 8],
  ['100.64.0.0', 10],
  ['127.0.0.0', 8],
  ['169.254.0.0', 16],
  ['172.16.0.0', 12],
  ['192.0.0.0', 24],
  ['192.168.0.0', 16],
  ['198.18.0.0', 15],
  ['224.0.0.0', 3],
] as const)
  inside.addSubnet(address, prefix, 'ipv4');
for (const [address, prefix] of [
  ['::', 127],
  ['fc00::', 7],
  ['fe80::', 10],
  ['ff00::', 8],
  ['64:ff9b::', 96],
] as const)
  inside.addSubnet(address, prefix, 'ipv6');

/** Whether an address belongs to the internet and not to this machine or the network around it. */
export function isPublicAddress(address: string): boolean {
  const mapped = /^::ffff:(\d+\.\d+\.\d+\.\d+)$/i.exec(address)?.[1];
  const plain = mapped ?? address;
  const family = net.isIP(plain);
  return family !== 0 && !inside.check(plain, family === 4 ? 'ipv4' : 'ipv6');
}

/** Whether a push service's address can be one at all: https, the usual port, a name or a public address. */
export function isPushEndpoint(endpoint: string): boolean {
  if (!URL.canParse(endpoint)) return false;
  const { protocol, hostname, port, username, password } = new URL(endpoint);
  if (protocol !== 'https:' || port !== '' || username !== '' || password !== '') return false;
  const bare = hostname.replace(/^\[|\]$/g, '');
  return net.isIP(bare) === 0 ? bare.includes('.') && !bare.endsWith('.local') : isPublicAddress(bare);
}

/** Connections to public addresses only, looked at after the name was resolved, so that no name can lead inside. */
export const publicOnlyAgent = (): https.Agent =>
  new https.Agent({
    keepAlive: true,
    lookup: (hostname, options, answer) =>
      dns.lookup(hostname, { ...options, all: true }, (error, found) => {
        const addresses = error ? [] : found.filter(({ address }) => isPublicAddress(address));
        const [first] = addresses;
        if (error || !first) answer(error ?? new Error(`${hostname} leads to no public address.`), '', 0);
        else if (options.all) answer(null, addresses);
        else answer(null, first.address, first.family);
      }),
  });
