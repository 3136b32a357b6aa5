import { lookup } from 'node:dns/promises';
import { BlockList, isIP } from 'node:net';
import { NtripProblem } from './problem.js';

export interface Resolved {
  address: string;
  family: 4 | 6;
}
export type Lookup = (name: string) => Promise<Resolved[]>;

/** Special-purpose addresses that are nobody's caster on the internet (IANA registries, RFC 6890 and its successors). */
const closed = new BlockList();
for (const [network, prefix] of [
  ['0.0.0.0', 8],
  ['10.0.0.0', 8],
  ['100.64.0.0', 10],
  ['127.0.0.0', 8],
  ['169.254.0.0', 16],
  ['172.16.0.0', 12],
  ['192.0.0.0', 24],
  ['192.168.0.0', 16],
  ['198.18.0.0', 15],
  ['224.0.0.0', 4],
  ['240.0.0.0', 4],
] as const)
  closed.addSubnet(network, prefix, 'ipv4');
for (const [network, prefix] of [
  ['::', 128],
  ['::1', 128],
  ['64:ff9b::', 96],
  ['64:ff9b:1::', 48],
  ['2002::', 16],
  ['fc00::', 7],
  ['fe80::', 10],
  ['ff00::', 8],
] as const)
  closed.addSubnet(network, prefix, 'ipv6');

/** The IPv4 address in an IPv4-mapped one (RFC 4291, 2.5.5.2); null for any other. */
function mappedIpv4(address: string): string | null {
  const [, tail] = /^::ffff:(.+)$/i.exec(address) ?? [];
  if (tail === undefined) return null;
  if (isIP(tail) === 4) return tail;
  const [high, low] = tail.split(':').map((part) => Number.parseInt(part, 16));
  return high === undefined || low === undefined
    ? null
    : [high >> 8, high & 255, low >> 8, low & 255].join('.');
}

/** Private, loopback, link-local and the like, IPv4 in IPv6 clothes included. */
export function isPrivate({ address, family }: Resolved): boolean {
  const plain = address.replace(/%.*$/, '');
  if (family === 4) return closed.check(plain, 'ipv4');
  const mapped = mappedIpv4(plain);
  return mapped === null ? closed.check(plain, 'ipv6') : closed.check(mapped, 'ipv4');
}

export const systemLookup: Lookup = async (name) =>
  (await lookup(name, { all: true })).map(({ address, family }) => ({
    address,
    family: family === 6 ? 6 : 4,
  }));

/**
 * The address that is connected to: resolved once, so that nothing else can be put in its place afterwards.
 * @throws NtripProblem
 */
export async function resolveOnce(
  name: string,
  allowPrivate: boolean,
  find: Lookup = systemLookup,
): Promise<Resolved> {
  const literal = isIP(name);
  let found: Resolved[];
  try {
    found = literal === 0 ? await find(name) : [{ address: name, family: literal === 6 ? 6 : 4 }];
  } catch (error) {
    const { code } = error as NodeJS.ErrnoException;
    throw code === 'EAI_AGAIN'
      ? new NtripProblem(
          `The name ${name} could not be looked up.`,
          'Check the address letter by letter, and whether this server reaches the internet.',
          { cause: error },
        )
      : new NtripProblem(
          `There is no address of the name ${name}.`,
          'Check the address letter by letter: one wrong character is the usual reason.',
          { cause: error },
        );
  }
  const open = allowPrivate ? found : found.filter((one) => !isPrivate(one));
  const [first] = open;
  if (first) return first;
  throw found.length === 0
    ? new NtripProblem(`There is no address of the name ${name}.`, 'Check the address letter by letter.')
    : new NtripProblem(
        `${name} is an address of a private network, which this server does not connect to.`,
        'Write the public address of the caster. Whoever runs the server may allow private ones (CASTER_PRIVATE_ADDRESSES).',
      );
}
