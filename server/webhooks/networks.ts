import { BlockList, isIP } from "node:net";

/** An address range in CIDR form, read. */
export interface Network {
  readonly address: string;
  readonly prefix: number;
  readonly family: "ipv4" | "ipv6";
}

/** Reads `10.20.0.0/16`; a bare address is itself alone. null for what is no network. */
export function readNetwork(text: string): Network | null {
  const [, address = "", prefixText] = /^([0-9A-Fa-f:.]+)(?:\/(\d{1,3}))?$/.exec(text) ?? [];
  const version = isIP(address);
  if (version === 0) return null;
  const longest = version === 4 ? 32 : 128;
  const prefix = prefixText === undefined ? longest : Number(prefixText);
  return prefix > longest ? null : { address, prefix, family: version === 4 ? "ipv4" : "ipv6" };
}

/** Address ranges that can be asked whether they hold an address. */
export function networkList(networks: readonly Network[]): BlockList {
  const listed = new BlockList();
  for (const { address, prefix, family } of networks) listed.addSubnet(address, prefix, family);
  return listed;
}

const listOf = (...texts: string[]) => networkList(texts.flatMap((text) => readNetwork(text) ?? []));

/** Not reachable over the public network: the IANA IPv4 Special-Purpose Address Registry (RFC 6890), and multicast. */
const specialV4 = listOf(
  "0.0.0.0/8",
  "10.0.0.0/8",
  "100.64.0.0/10",
  "127.0.0.0/8",
  "169.254.0.0/16",
  "172.16.0.0/12",
  "192.0.0.0/24",
  "192.0.2.0/24",
  "192.31.196.0/24",
  "192.52.193.0/24",
  "192.88.99.0/24",
  "192.168.0.0/16",
  "192.175.48.0/24",
  "198.18.0.0/15",
  "198.51.100.0/24",
  "203.0.113.0/24",
  "224.0.0.0/4",
  "240.0.0.0/4",
);

/** Global unicast (RFC 4291): all else, IPv4 in IPv6 and unique local addresses among it, is not public. */
const globalV6 = listOf("2000::/3");

/** Of global unicast, what the IANA IPv6 Special-Purpose Address Registry takes out: tunnels, documentation, benchmarks. */
const specialV6 = listOf("2001::/23", "2001:db8::/32", "2002::/16", "2620:4f:8000::/48", "3fff::/20");

/** Whether an address is one of the public network. */
export function isPublicAddress(address: string): boolean {
  const version = isIP(address);
  if (version === 4) return !specialV4.check(address, "ipv4");
  if (version !== 6 || address.includes("%")) return false;
  return globalV6.check(address, "ipv6") && !specialV6.check(address, "ipv6");
}

/** Whether a list holds an address; IPv4 written as IPv6 is taken for what it is. */
export function holdsAddress(list: BlockList, address: string): boolean {
  const version = isIP(address);
  if (version === 0 || address.includes("%")) return false;
  return list.check(address, version === 4 ? "ipv4" : "ipv6");
}
