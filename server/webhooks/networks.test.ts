import { describe, expect, it } from "vitest";
import { holdsAddress, isPublicAddress, networkList, readNetwork } from "./networks.ts";

describe("readNetwork", () => {
  it("reads both families, with and without a prefix, and nothing else", () => {
    expect(readNetwork("10.20.0.0/16")).toEqual({ address: "10.20.0.0", prefix: 16, family: "ipv4" });
    expect(readNetwork("10.20.0.1")).toEqual({ address: "10.20.0.1", prefix: 32, family: "ipv4" });
    expect(readNetwork("fd12:3456::/32")).toEqual({ address: "fd12:3456::", prefix: 32, family: "ipv6" });
    for (const text of ["", "10.0.0.0/33", "::1/129", "10.0.0", "plant", "10.0.0.0/8/8", "fe80::1%eth0"])
      expect(readNetwork(text)).toBeNull();
  });
});

describe("isPublicAddress", () => {
  it("holds each range of the IANA special-purpose registries at its first and last address, and not beside it", () => {
    const ranges: [last: string, first: string, beforeFirst: string | null, afterLast: string | null][] = [
      ["10.255.255.255", "10.0.0.0", "9.255.255.255", "11.0.0.0"],
      ["100.127.255.255", "100.64.0.0", "100.63.255.255", "100.128.0.0"],
      ["127.255.255.255", "127.0.0.0", "126.255.255.255", "128.0.0.0"],
      ["169.254.255.255", "169.254.0.0", "169.253.255.255", "169.255.0.0"],
      ["172.31.255.255", "172.16.0.0", "172.15.255.255", "172.32.0.0"],
      ["192.168.255.255", "192.168.0.0", "192.167.255.255", "192.169.0.0"],
      ["198.19.255.255", "198.18.0.0", "198.17.255.255", "198.20.0.0"],
      ["255.255.255.255", "224.0.0.0", "223.255.255.255", null],
      ["0.255.255.255", "0.0.0.0", null, "1.0.0.0"],
    ];
    for (const [last, first, before, after] of ranges) {
      expect([first, isPublicAddress(first)]).toEqual([first, false]);
      expect([last, isPublicAddress(last)]).toEqual([last, false]);
      for (const beside of [before, after])
        if (beside) expect([beside, isPublicAddress(beside)]).toEqual([beside, true]);
    }
  });

  it("takes of IPv6 what is global unicast, and no way round into IPv4", () => {
    for (const address of ["2606:4700::1111", "2a00:1450::1"]) expect(isPublicAddress(address)).toBe(true);
    for (const address of [
      "::",
      "::1",
      "::ffff:8.8.8.8",
      "::ffff:10.0.0.1",
      "64:ff9b::808:808",
      "2002:a00:1::1",
      "2001::1",
      "2001:db8::1",
      "fc00::1",
      "fdff::1",
      "fe80::1",
      "fe80::1%eth0",
      "ff02::1",
      "4000::1",
      "not an address",
    ])
      expect([address, isPublicAddress(address)]).toEqual([address, false]);
  });
});

describe("holdsAddress", () => {
  it("takes IPv4 written as IPv6 for what it is", () => {
    const list = networkList([{ address: "127.0.0.0", prefix: 8, family: "ipv4" }]);
    expect(
      ["127.1.2.3", "::ffff:127.0.0.1", "128.0.0.1", "::1", "x"].map((a) => holdsAddress(list, a)),
    ).toEqual([true, true, false, false, false]);
  });
});
