import ipaddr from 'ipaddr.js';

/** The network a try to sign in came from: an IPv6 subscriber has a whole /64 to try from. */
export function networkOf(address: string | undefined): string {
  if (address === undefined || !ipaddr.isValid(address)) return 'unknown';
  // An IPv4 address written as an IPv6 one is the IPv4 address.
  const read = ipaddr.process(address);
  const bytes = read.toByteArray();
  return (read.kind() === 'ipv6' ? bytes.slice(0, 8) : bytes).join('.');
}
