import { describe, expect, it } from "vitest";
import { readMarkdown, readRuns } from "./read-markdown.ts";

describe("readMarkdown", () => {
  it("reads headings, paragraphs over several lines, and lists whose items go on", () => {
    const text = "# Changes\n\nWhat changed\nstands here.\n\n## 1.0.0\n\n- One\n  goes on.\n- Two\n";
    expect(readMarkdown(text)).toEqual([
      { kind: "heading", level: 1, runs: [{ kind: "plain", text: "Changes" }] },
      { kind: "paragraph", runs: [{ kind: "plain", text: "What changed stands here." }] },
      { kind: "heading", level: 2, runs: [{ kind: "plain", text: "1.0.0" }] },
      {
        kind: "list",
        items: [[{ kind: "plain", text: "One goes on." }], [{ kind: "plain", text: "Two" }]],
      },
    ]);
  });

  it("takes lines right under a heading for a paragraph", () => {
    expect(readMarkdown("## 1.1.0\nMended.").map(({ kind }) => kind)).toEqual(["heading", "paragraph"]);
  });

  it("reads nothing out of nothing", () => {
    expect(readMarkdown("\n\n")).toEqual([]);
  });
});

describe("readRuns", () => {
  it("tells strong words and code from plain ones", () => {
    expect(readRuns("**Fits** by `mad`, so")).toEqual([
      { kind: "strong", text: "Fits" },
      { kind: "plain", text: " by " },
      { kind: "code", text: "mad" },
      { kind: "plain", text: ", so" },
    ]);
  });

  it("leaves marks that do not close as they stand", () => {
    expect(readRuns("2 ** 3 and `x")).toEqual([{ kind: "plain", text: "2 ** 3 and `x" }]);
  });
});
