import { BlockList, isIP } from 'node:net';

/**
 * Addresses that lead to no machine on the public network (IANA special-purpose registries, RFC 6890 and its
 * updates): private, loopback, link-local, shared, documentation, multicast, reserved.
 */
const notPublic = new BlockList();
for (const [network, prefix] of [
  ['0.0.0.0', 8],
  ['10.0.0.0', 8],
  ['100.64.0.0', 10],
  ['127.0.0.0', 8],
  ['169.254.0.0', 16],
  ['172.16.0.0', 12],
  ['192.0.0.0', 24],
  ['192.0.2.0', 24],
  ['192.88.99.0', 24],
  ['192.168.0.0', 16],
  ['198.18.0.0', 15],
  ['198.51.100.0', 24],
  ['203.0.113.0', 24],
  ['224.0.0.0', 3],
] as const) {
  notPublic.addSubnet(network, prefix, 'ipv4');
}
// Of IPv6 only 2000::/3 is given out; inside it these lead into an IPv4 network, or to documentation.
for (const [network, prefix] of [
  ['2001::', 23],
  ['2001:db8::', 32],
  ['2002::', 16],
  ['3fff::', 20],
] as const) {
  notPublic.addSubnet(network, prefix, 'ipv6');
}
const givenOut = new BlockList();
givenOut.addSubnet('2000::', 3, 'ipv6');

export const isPublicAddress = (address: string): boolean => {
  const version = isIP(address);
  if (version === 4) return !notPublic.check(address, 'ipv4');
  return version === 6 && givenOut.check(address, 'ipv6') && !notPublic.check(address, 'ipv6');
};

const ownNetworkNames = /(^|\.)(localhost|local|internal|intranet|lan|home|corp|home\.arpa)\.?$/i;

/**
 * The address is chosen by whoever holds the browser, and this server will call it: so it must be a name on the
 * public network, over https at its usual port. What the name leads to is judged again when it is called.
 */
export const isPushEndpoint = (endpoint: string): boolean => {
  if (!URL.canParse(endpoint)) return false;
  const { protocol, hostname, port, username, password } = new URL(endpoint);
  if (protocol !== 'https:' || port !== '' || username !== '' || password !== '') return false;
  // The parser has turned every spelling of an IPv4 address into the usual one; an IPv6 one stands in brackets.
  if (isIP(hostname) !== 0 || hostname.startsWith('[')) return false;
  return hostname.includes('.') && !ownNetworkNames.test(hostname);
};
