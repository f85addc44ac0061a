import { describe, expect, it } from "vitest";
import { readFile } from "./project-files.ts";

export interface ProjectFile {
  readonly path: string;
  readonly text: string;
}

/** A rule that all files of a kind keep. */
export interface Rule {
  /** Paths of the files it is about. */
  readonly files: readonly string[];
  /** What of one file breaks the rule, each with its place. */
  readonly breaches: (file: ProjectFile) => readonly string[];
  /** Files made up to break it: a rule that finds nothing in them guards nothing. */
  readonly caught: readonly ProjectFile[];
  /** Files made up to come near a breach without being one. */
  readonly spared?: readonly ProjectFile[];
}

/** A file made up to try a rule on. */
export const sample = (text: string, path = "server/sample.ts"): ProjectFile => ({ path, text });

/** Two tests and more: that the project keeps the rule, and that the rule can tell. */
export function describeRule(title: string, { files, breaches, caught, spared = [] }: Rule): void {
  describe(title, () => {
    it("holds in every file", () => {
      expect(files.length).toBeGreaterThan(0);
      expect(files.flatMap((path) => breaches({ path, text: readFile(path) }))).toEqual([]);
    });
    it.each(titled(caught))("is broken by %s", (_, file) => {
      expect(breaches(file).length).toBeGreaterThan(0);
    });
    if (spared.length > 0)
      it.each(titled(spared))("is kept by %s", (_, file) => {
        expect(breaches(file)).toEqual([]);
      });
  });
}

const titled = (files: readonly ProjectFile[]) =>
  files.map((file) => [`${file.path} ${JSON.stringify(file.text.slice(0, 60))}`, file] as const);
