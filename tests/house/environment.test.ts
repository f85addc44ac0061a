import ts from "typescript";
import { describe, expect, it } from "vitest";
import { sample } from "./describe-rule.ts";
import { nodesOf, parseCode } from "./parse-code.ts";
import { readFile } from "./project-files.ts";

/** Told to the service by `npm start`, never by a person. */
const betweenOurselves = ["PRIVATE_DATABASE"];

/** The members of the object that a constant of this name holds, in `z.object({ … })` or as it stands. */
function membersOf(code: string, constant: string): string[] {
  return nodesOf(parseCode(sample(code)))
    .filter(ts.isVariableDeclaration)
    .filter(({ name }) => name.getText() === constant)
    .flatMap(({ initializer }) =>
      initializer ? nodesOf(initializer).filter(ts.isObjectLiteralExpression) : [],
    )
    .slice(0, 1)
    .flatMap(({ properties }) => properties.map(({ name }) => name?.getText() ?? ""));
}

/** What may be set: a line of .env.example, commented out or not. */
const settable = (text: string): string[] =>
  [...text.matchAll(/^#?([A-Z][A-Z_]+)=/gm)].map(([, name = ""]) => name);

/** The rows of a table of names. */
const tabled = (text: string): string[] =>
  [...text.matchAll(/^\| `([A-Z][A-Z_]+)` \|/gm)].map(([, name = ""]) => name);

describe("the names of the environment", () => {
  const known = membersOf(readFile("server/config.ts"), "environmentSchema")
    .filter((name) => !betweenOurselves.includes(name))
    .sort();

  it("are read from the code as it stands", () => {
    expect(membersOf("const a = z.object({ HOST: x(), PORT: y({ b: 1 }) });", "a")).toEqual(["HOST", "PORT"]);
    expect(known).toContain("DATABASE_URL");
    expect(settable("# HOST is a name.\n#HOST=a\nPORT=1\n")).toEqual(["HOST", "PORT"]);
    expect(tabled("| `HOST` | where |\nHOST\n| `port` | x |")).toEqual(["HOST"]);
  });

  it("are in .env.example those of server/config.ts, once each", () => {
    expect(settable(readFile(".env.example")).sort()).toEqual(known);
  });

  it("are in README.md those of server/config.ts, once each", () => {
    expect(tabled(readFile("README.md")).sort()).toEqual(known);
  });
});
