import { describe, expect, it } from "vitest";
import { axisMethods } from "../../console/src/features/guide/content/axis-methods.ts";
import { circleCriteria } from "../../console/src/features/guide/content/circle-criteria.ts";
import { confirmationMethods } from "../../console/src/features/guide/content/confirmation-methods.ts";
import { unitUses } from "../../console/src/features/guide/content/conventions.ts";
import { fewestMoves } from "../../console/src/features/guide/content/fewest-moves.ts";
import { fitQuality } from "../../console/src/features/guide/content/fit-quality.ts";
import { moveSolving } from "../../console/src/features/guide/content/move-solving.ts";
import { planMethods } from "../../console/src/features/guide/content/plan-methods.ts";
import { readingForms } from "../../console/src/features/guide/content/reading-forms.ts";
import { repeatabilityMethods } from "../../console/src/features/guide/content/repeatability-methods.ts";
import { sightMethods } from "../../console/src/features/guide/content/sight-methods.ts";
import { shimChoice } from "../../console/src/features/guide/content/shim-choice.ts";
import { targetMethods } from "../../console/src/features/guide/content/target-methods.ts";
import { verdictRules } from "../../console/src/features/guide/content/verdict-rules.ts";
import { obstacleMeanings, signatureRefusals } from "../../console/src/features/guide/content/sign-off.ts";
import { nextSteps } from "../../console/src/features/jobs/components/next-steps.ts";
import { jobSteps } from "../../console/src/features/guide/content/job-steps.ts";
import { guidePages } from "../../console/src/features/guide/guide-pages.ts";
import { commonPractice, ownRule, type Method } from "../../console/src/features/guide/method.ts";
import { axisMethods as axisChoices } from "../../shared/schemas/axis-deviations.ts";
import { boreSchema, methodSchema } from "../../shared/schemas/bore-fits.ts";
import { calculationKinds } from "../../shared/schemas/calculations.ts";
import { furtherUnitChoices, unitChoices } from "../../shared/units.ts";
import { problemCodes } from "../../shared/error-codes.ts";
import { projectFiles, readFile } from "./project-files.ts";

const engine = projectFiles.filter((path) => /^server\/(compute|calculations)\/.*\.ts$/.test(path));

/** What the engine's docblocks say, in one line: a source may stand over two lines of them. */
const docblocks = engine
  .filter((path) => !path.endsWith(".test.ts"))
  .flatMap((path) => [
    ...readFile(path).matchAll(/\/\*\*[\s\S]*?\*\/|^\s*source: .*$|^const \w+ =\n? +".*"/gm),
  ])
  .map(([text]) => text.replaceAll(/\s*\n\s*(\*(?!\/))?\s*/g, " "))
  .join("\n");
const engineText = engine.map(readFile).join("\n");

const pages: Readonly<Record<string, readonly Method[]>> = {
  readingForms,
  circleCriteria,
  fitQuality,
  axisMethods,
  verdictRules,
  moveSolving,
  fewestMoves,
  shimChoice,
  targetMethods,
  confirmationMethods,
  repeatabilityMethods,
  planMethods,
  sightMethods,
};
const methods = Object.values(pages).flat();

describe("the methods of the guide", () => {
  it("name only sources that the engine's docblocks name, word for word", () => {
    const unknown = methods.flatMap(({ id, sources }) =>
      sources
        .filter((source) => source !== commonPractice && source !== ownRule && !docblocks.includes(source))
        .map((source) => `${id}: ${source}`),
    );
    expect(unknown).toEqual([]);
  });

  it("have a source each, and say so where there is none", () => {
    expect(methods.filter(({ sources }) => sources.length === 0).map(({ id }) => id)).toEqual([]);
    expect(docblocks).toContain("IEEE Trans. PAMI 13 (1991) 1115");
    expect(docblocks).not.toContain("A source that nobody names");
  });

  it("have an anchor of their own on their page, and explain letters that stand in their formulas", () => {
    expect(new Set(methods.map(({ id }) => id)).size).toBe(methods.length);
    const idle = methods.flatMap(({ id, formulas, says, where }) =>
      where
        .flatMap(([letters]) => letters.split(", "))
        .filter((letter) => ![...formulas, ...says].some((line) => line.includes(letter)))
        .map((letter) => `${id}: ${letter}`),
    );
    expect(idle).toEqual([]);
  });

  it("leave the marks of formulas out of their sentences", () => {
    const marked = methods.flatMap(({ id, says }) =>
      says.filter((line) => /[_^]/.test(line.replaceAll(/`[^`]*`/g, ""))).map((line) => `${id}: ${line}`),
    );
    expect(marked).toEqual([]);
  });

  it("name only codes that the service knows", () => {
    const named = methods.flatMap(({ says }) =>
      says.flatMap((line) => [...line.matchAll(/`([a-z]+(?:_[a-z]+)+)`/g)].map(([, code = ""]) => code)),
    );
    const known = (code: string) =>
      (problemCodes as readonly string[]).includes(code) || engineText.includes(`"${code}"`);
    expect(named.length).toBeGreaterThan(5);
    expect(named.filter((code) => !known(code))).toEqual([]);
  });
});

describe("the guide", () => {
  const asked = (list: readonly Method[]) => list.map(({ asked: words }) => words ?? "").join("\n");

  it("explains every form of reading, every criterion and every method of the axis", () => {
    const forms = boreSchema.options.map(({ shape }) => shape.form.value);
    expect(forms.filter((form) => !asked(readingForms).includes(`form: ${form}`))).toEqual([]);
    expect(
      methodSchema.options.filter((method) => !asked(circleCriteria).includes(`method: ${method}`)),
    ).toEqual([]);
    expect(axisChoices.filter((method) => !asked(axisMethods).includes(`method: ${method}`))).toEqual([]);
  });

  it("has a place in the job for every calculation, and a page of its own for each subject", () => {
    const slugs = guidePages.map(({ slug }) => slug);
    expect(new Set(slugs).size).toBe(slugs.length);
    expect(calculationKinds.filter((kind) => !jobSteps.some((step) => step.kind === kind))).toEqual([]);
  });

  it("says what every unit of a call is used for", () => {
    expect(unitUses.map(({ dimension }) => dimension)).toEqual(
      Object.keys({ ...unitChoices, ...furtherUnitChoices }),
    );
  });

  it("says of every obstacle to a signature what it means and what to do, and of nothing else", () => {
    const raised = [...readFile("server/jobs/sign-off.ts").matchAll(/flag\(\s*"(\w+)"/g)].map(
      ([, code]) => code,
    );
    const codes = [...new Set(raised)].sort();
    expect(codes.length).toBeGreaterThan(10);
    expect(Object.keys(obstacleMeanings).sort()).toEqual(codes);
    expect(Object.keys(nextSteps).sort()).toEqual(codes);
  });

  it("names what the call that signs refuses, as the service documents it", () => {
    const [, , errors = ""] =
      /operationId: "signJob"([\s\S]*?)errors: \[(.*?)\]/.exec(readFile("server/routes/jobs.ts")) ?? [];
    const documented = [...errors.matchAll(/"(\w+)"/g)].map(([, code]) => code);
    expect([...signatureRefusals].sort()).toEqual(documented.sort());
  });
});
