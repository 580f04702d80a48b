import { expect, test } from "vitest";
import { sourceOf } from "./limits.ts";

test.each([
  ["203.0.113.9", "203.0.113.9", "an IPv4 address is its own source"],
  ["::ffff:203.0.113.9", "203.0.113.9", "the same address as a dual-stack socket reports it"],
  ["2001:db8:1:2:3:4:5:6", "2001:db8:1:2::/64", "the network of an IPv6 address"],
  ["2001:db8:1:2::6", "2001:db8:1:2::/64", "another address of that network"],
  ["2001:0DB8:0001:0002:ffff::", "2001:db8:1:2::/64", "another spelling of it"],
  ["2001:db8::1", "2001:db8:0:0::/64", "zeros that were left out are put back"],
  ["fe80::1%eth0", "fe80:0:0:0::/64", "without the name of the network card"],
  ["::1", "0:0:0:0::/64", "loopback"],
  ["", "", "an address nobody knows"],
])("sourceOf(%j) is %j: %s", (address, source) => {
  expect(sourceOf(address)).toBe(source);
});
