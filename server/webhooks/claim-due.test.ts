import { describe, expect, it } from "vitest";
import { chooseDue, SLOTS, type Place } from "./claim-due.ts";

const place = (organisationId: string, endpointId: string, id: string): Place => ({
  organisationId,
  endpointId,
  id,
});

describe("chooseDue", () => {
  it("takes two of an endpoint and six of an organisation, oldest first, beside what is under way", () => {
    const due = ["a", "b", "c", "d"].flatMap((endpoint) =>
      [1, 2, 3].map((nth) => place("works", endpoint, `${endpoint}${nth}`)),
    );
    expect(chooseDue(due, []).map(({ id }) => id)).toEqual(["a1", "a2", "b1", "b2", "c1", "c2"]);
    const underWay = [place("works", "a", "a0"), place("works", "b", "b0")];
    expect(chooseDue(due, underWay).map(({ id }) => id)).toEqual(["a1", "b1", "c1", "c2"]);
  });

  it("leaves the rest of the slots to others when one hangs", () => {
    const hanging = Array.from({ length: 50 }, (_, nth) => place("slow", "s", `s${nth}`));
    const others = Array.from({ length: 50 }, (_, nth) => place(`w${nth}`, `e${nth}`, `o${nth}`));
    const chosen = chooseDue([...hanging, ...others], []);
    expect(chosen).toHaveLength(SLOTS);
    expect(chosen.filter(({ organisationId }) => organisationId === "slow")).toHaveLength(2);
  });
});
