import { expect, test } from "vitest"
import { limitFor, limitFrom } from "./limit-attempts"

test.each([
  ["192.0.2.7", "192.0.2.7"],
  ["::ffff:192.0.2.7", "192.0.2.7"],
  ["2001:db8:1:2:3:4:5:6", "2001:db8:1:2::/64"],
  ["2001:db8:1:2::6", "2001:db8:1:2::/64"],
  ["2001:db8::1", "2001:db8:0:0::/64"],
  ["::1", "0:0:0:0::/64"],
])("attempts from %s count for %s", (address, network) =>
  expect(limitFrom("sign-in", address).key).toBe(`sign-in from ${network}`),
)

test("attempts for an address count without regard to case", () =>
  expect(limitFor("sign-in", "A@Example.org", 1).key).toBe(limitFor("sign-in", "a@example.org", 1).key))
