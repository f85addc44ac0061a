import { lookup } from "node:dns/promises";
import { isIP } from "node:net";
import { networkInterfaces } from "node:os";
import type { Config } from "../config.ts";
import { holdsAddress, isPublicAddress, networkList } from "./networks.ts";

export interface Address {
  readonly address: string;
  readonly family: 4 | 6;
}

/** The addresses of a name. @throws where it has none */
export type ResolveHost = (name: string) => Promise<readonly Address[]>;

/** As the machine itself resolves names. */
export const resolveHost: ResolveHost = async (name) =>
  (await lookup(name, { all: true, verbatim: true })).map(({ address, family }) => ({
    address,
    family: family === 6 ? 6 : 4,
  }));

/** Nothing is sent there; `message` says why, as a sentence that may be shown. */
export class TargetRefused extends Error {
  constructor(reason: string) {
    super(reason);
    this.name = "TargetRefused";
  }
}

/** An address that may be called, with every number that its name has now: the call is held to them. */
export interface Target {
  readonly url: URL;
  readonly addresses: readonly Address[];
}

type TargetRules = Pick<Config, "webhookAllowedNetworks" | "webhookPorts" | "publicUrl">;

/**
 * Judges where a webhook would go: https on a public address and an allowed port, or any address of a network that is
 * allowed by name. Done when it is set, and again before each delivery, whose connection is pinned to what was checked.
 * @throws TargetRefused
 */
export async function checkTarget(text: string, rules: TargetRules, resolve: ResolveHost): Promise<Target> {
  const url = readTarget(text, rules);
  const host = rootless(url.hostname).replace(/^\[(.*)\]$/, "$1");
  const addresses = await addressesOf(host, resolve);
  const allowed = networkList(rules.webhookAllowedNetworks);
  if (addresses.every(({ address }) => holdsAddress(allowed, address))) return { url, addresses };
  const own = ownAddresses();
  for (const { address } of addresses) {
    if (holdsAddress(allowed, address)) continue;
    if (!isPublicAddress(address)) {
      throw new TargetRefused(`The host has the address ${address}, which is not on the public network.`);
    }
    if (own.has(address)) throw new TargetRefused("The host is the one that this service runs on.");
  }
  if (url.protocol !== "https:") throw new TargetRefused("Only https addresses are taken.");
  const port = url.port === "" ? 443 : Number(url.port);
  if (!rules.webhookPorts.includes(port)) {
    throw new TargetRefused(
      `Port ${port} is not taken; ${rules.webhookPorts.join(", ")} ${rules.webhookPorts.length === 1 ? "is" : "are"}.`,
    );
  }
  return { url, addresses };
}

/** What can be told from the address alone. */
function readTarget(text: string, { publicUrl }: TargetRules): URL {
  if (!URL.canParse(text)) throw new TargetRefused("This is not an address such as https://host/path.");
  const url = new URL(text);
  if (url.protocol !== "https:" && url.protocol !== "http:") {
    throw new TargetRefused("Only https addresses are taken.");
  }
  if (url.username !== "" || url.password !== "") {
    throw new TargetRefused("An address with a name or password in it is not taken.");
  }
  if (url.hash !== "") throw new TargetRefused("An address ends before a #.");
  if (publicUrl !== null && rootless(url.hostname) === rootless(new URL(publicUrl).hostname)) {
    throw new TargetRefused("The host is this service's own.");
  }
  return url;
}

/** A name that ends in the dot of the root is the same name. */
const rootless = (hostname: string): string => hostname.replace(/\.$/, "");

async function addressesOf(host: string, resolve: ResolveHost): Promise<readonly Address[]> {
  const version = isIP(host);
  if (version !== 0) return [{ address: host, family: version === 6 ? 6 : 4 }];
  const found = await resolve(host).catch(() => []);
  if (found.length === 0) throw new TargetRefused("The name of the host has no address.");
  return found;
}

function ownAddresses(): Set<string> {
  return new Set(
    Object.values(networkInterfaces()).flatMap((addresses) =>
      (addresses ?? []).map(({ address }) => address),
    ),
  );
}
