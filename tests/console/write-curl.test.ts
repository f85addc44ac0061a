import { execFileSync } from "node:child_process";
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { keyPlaceholder, writeCurl } from "../../console/src/features/try-call/components/write-curl.ts";

/** What curl is given when a POSIX shell runs the line. */
function argumentsOf(line: string): string[] {
  const script = `curl() { for word in "$@"; do printf '%s\\0' "$word"; done; }\n${line}\n`;
  const env = { PATH: process.env["PATH"] ?? "", BOREWRIGHT_KEY: "bw_live_example" };
  const words = execFileSync("sh", ["-c", script], { env }).toString().split("\0");
  return words.slice(0, -1);
}

describe("writeCurl", () => {
  const origin = "http://127.0.0.1:4100";

  it("hands the address, the key of the environment and the body to curl", () => {
    const body = '{\n  "note": "it\'s $HOME, `date`, \\\\ and !"\n}';
    expect(argumentsOf(writeCurl(origin, "/v1/bore-fits", body))).toEqual([
      "-sS",
      "http://127.0.0.1:4100/v1/bore-fits",
      "-H",
      "Authorization: Bearer bw_live_example",
      "-H",
      "Content-Type: application/json",
      "--data-binary",
      body,
    ]);
  });

  it("carries every body to the last character", () => {
    const text = fc.string({
      unit: fc.constantFrom("'", '"', "\\", "$", "`", "\n", " ", "!", "a", "ä", "…", "😀"),
      maxLength: 40,
    });
    fc.assert(
      fc.property(text, (body) => {
        expect(argumentsOf(writeCurl(origin, "/v1/bore-fits", body)).at(-1)).toBe(body);
      }),
      { numRuns: 60 },
    );
  });

  it("never holds a key, only the variable that stands for it", () => {
    expect(writeCurl(origin, "/v1/bore-fits", "{}")).toContain(`Bearer ${keyPlaceholder}"`);
  });
});
