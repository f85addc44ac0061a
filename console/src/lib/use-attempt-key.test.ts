import { renderHook } from "@testing-library/react";
import { describe, expect, it } from "vitest";
import { refusedRecord } from "../testing/sample-records.ts";
import { CancelledError, NoAnswerError, ProblemError } from "./service-error.ts";
import { useAttemptKey } from "./use-attempt-key.ts";

const problem = refusedRecord().problem;
if (!problem) throw new Error("The sample is a refusal.");
const refused = (status: number, code: typeof problem.code) => new ProblemError({ ...problem, status, code });

describe("the Idempotency-Key of an attempt", () => {
  it("is 128 random bits, another one for another body", () => {
    const { keyFor } = renderHook(() => useAttemptKey()).result.current;
    const first = keyFor("a");
    expect(first).toMatch(/^[0-9a-f]{32}$/);
    expect(keyFor("b")).not.toBe(first);
  });

  it.each([
    ["no answer came", new NoAnswerError("Gone.")],
    ["the call was cancelled", new CancelledError()],
    ["the service failed", refused(503, "unavailable")],
    ["the first call still runs", refused(409, "idempotency_in_progress")],
    ["the session ended", refused(401, "session_expired")],
  ])("stays while the outcome is open: %s", (_, error) => {
    const { keyFor, settle } = renderHook(() => useAttemptKey()).result.current;
    const first = keyFor("a");
    settle(error);
    expect(keyFor("a")).toBe(first);
  });

  it.each([
    ["an answer", undefined],
    ["a refusal", refused(422, "too_few_points")],
  ])("is new after %s", (_, error) => {
    const { keyFor, settle } = renderHook(() => useAttemptKey()).result.current;
    const first = keyFor("a");
    settle(error);
    expect(keyFor("a")).not.toBe(first);
  });
});
