import { afterAll, beforeAll, describe, expect, it } from "vitest";
import type { ShimMoveRequest } from "../../shared/schemas/shim-moves.ts";
import { boreFitKind } from "../../server/calculations/bore-fit.ts";
import { shimMoveKind } from "../../server/calculations/shim-move.ts";
import { ComputePool } from "../../server/services/compute-pool.ts";
import { everyFormMm } from "../support/bore-requests.ts";
import { moveRequest } from "../support/move-requests.ts";

const long: ShimMoveRequest = { ...moveRequest, shims: { cutToSize: { increment: 0.01 } } };

describe("ComputePool", () => {
  const pool = new ComputePool();
  beforeAll(() => pool.run(shimMoveKind, long));
  afterAll(() => pool.close());

  it("answers from a thread what this thread would answer, to the last bit", async () => {
    expect(shimMoveKind.isLong!(long)).toBe(true);
    const outcome = await pool.run(shimMoveKind, long);
    const here = shimMoveKind.answer(long);
    expect(outcome.status).toBe("succeeded");
    expect(JSON.stringify(outcome.status === "succeeded" && outcome.answer)).toBe(JSON.stringify(here));
  });

  it("draws in a thread what this thread would draw, to the last bit", async () => {
    const trials = { ...everyFormMm, monteCarlo: { trials: 1_000, seed: 11 } };
    const outcome = await pool.run(boreFitKind, trials);
    expect(boreFitKind.isLong!(trials)).toBe(true);
    expect(JSON.stringify(outcome.status === "succeeded" && outcome.answer)).toBe(
      JSON.stringify(boreFitKind.answer(trials)),
    );
  });

  it("brings back a refusal with its pointers", async () => {
    const outcome = await pool.run(shimMoveKind, { ...long, reference: ["nobody"] });
    expect(outcome).toMatchObject({
      status: "failed",
      faults: [{ pointer: "/reference/0", code: "unknown_reference" }],
    });
  });

  it("leaves this thread free while a long one computes", async () => {
    const order: string[] = [];
    const longs = Promise.all(
      Array.from({ length: 10 }, () => pool.run(shimMoveKind, long).then(() => order.push("long"))),
    );
    await pool.run(shimMoveKind, moveRequest).then(() => order.push("short"));
    await longs;
    expect(order[0]).toBe("short");
    expect(order).toHaveLength(11);
  });

  it("tells callers to come again when too many wait", async () => {
    const crowded = new ComputePool({ waitingMax: 0 });
    const first = crowded.run(shimMoveKind, long);
    const refusals = await Promise.allSettled(
      Array.from({ length: 3 }, async () => crowded.run(shimMoveKind, long)),
    );
    expect((await first).status).toBe("succeeded");
    const reasons = refusals.flatMap((each) => (each.status === "rejected" ? [each.reason as unknown] : []));
    expect(reasons.length).toBeGreaterThan(0);
    for (const reason of reasons) {
      expect(reason).toMatchObject({ code: "unavailable", headers: { "Retry-After": "5" } });
    }
    await crowded.close();
  });
});
