import { describeRule, sample, type ProjectFile } from "./describe-rule.ts";
import { projectFiles } from "./project-files.ts";

/** Written apart, so that this file does not break the rules that it states. */
const joined = (...parts: string[]) => parts.join("");

const lock = "package-lock.json";

function matches({ path, text }: ProjectFile, patterns: readonly RegExp[]): string[] {
  return patterns.flatMap((pattern) =>
    [...text.matchAll(pattern)].map(({ 0: found, index }) => {
      const line = text.slice(0, index).split("\n").length;
      return `${path}:${line} ${found.trim()}`;
    }),
  );
}

/** A project that speaks of the desk it was written at is of no use at another. */
describeRule("no word about who or what wrote it", {
  files: projectFiles.filter((path) => path !== lock),
  breaches: (file) =>
    matches(file, [
      /\bA\.?I\b\.?(?!-)/g,
      /\bL[L]Ms?\b/g,
      /\b(?:large )?language[ ]models?\b/gi,
      /\bclaud[e]\b|\banthropi[c]\b|\bopena[i]\b|\bcopilo[t]\b|\bchat[ -]?(?:bot|gp[t])\b/gi,
      /\b(?:coding|sub-?) ?agen[t]s?\b|\bsubagen[t]s?\b/gi,
      /\b(?:previous|next|earlier|later|this|another) (?:sitting|helper|maintainer'?s? session)\b/gi,
      /\bissues sho[w]\b|\bissue #?\d+\b/gi,
    ]),
  caught: [
    sample(joined("// Written by A", "I"), "server/a.ts"),
    sample(joined("an L", "LM wrote this"), "README.md"),
    sample(joined("the next ", "sitting"), "DEVELOPERS.md"),
    sample(joined("see issue", " 2"), "DEVELOPERS.md"),
  ],
  spared: [
    sample("User-Agent: curl", "README.md"),
    sample("A session ends after an hour; AISI 410 steel"),
    sample("MAIN AIR"),
  ],
});

/** Absolute paths of a machine mean nothing on the next one. */
describeRule("no path of one machine", {
  files: projectFiles.filter((path) => path !== lock),
  breaches: (file) => matches(file, [/(?<![\w.*}/-])\/(?:wor[k]|roo[t]|hom[e]|tm[p]|User[s])\/[\w.-]*/g]),
  caught: [
    sample(joined('read("/wo', 'rk/main/a.json")')),
    sample(joined("cd /ho", "me/mason/borewright"), "README.md"),
    sample(joined("DATA_DIR=/tm", "p/data"), "README.md"),
  ],
  spared: [
    sample(joined('import a from "./wo', 'rk/a.ts";')),
    sample('app.get("/v1/bore-fits")'),
    sample("/dev/null"),
  ],
});

/** The lock file must install from whichever registry the owner of the machine uses. */
describeRule("no package registry by name", {
  files: projectFiles,
  breaches: (file) =>
    matches(file, [
      /\bregistry\.[\w-]+\.\w+/g,
      /\b(?:npmj[s]\.(?:org|com)|yarnpk[g]\.com|pyp[i]\.org|deb\.debia[n]\.org|ghc[r]\.io)\b/g,
      /"resolve[d]":/g,
    ]),
  caught: [
    sample(joined('"https://registry', ".npm", 'js.org/zod"'), lock),
    sample(joined('{ "reso', 'lved": "" }'), lock),
    sample(joined("from deb.deb", "ian.org"), "README.md"),
  ],
  spared: [sample("const registry = new OpenAPIRegistry();"), sample("npm config get registry", "README.md")],
});
