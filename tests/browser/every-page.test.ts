import type { Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { computations } from "../../console/src/config/paths.ts";
import { guidePages } from "../../console/src/features/guide/guide-pages.ts";
import { recordOutage } from "../../server/demo/record-outage.ts";
import { noMisdeeds, openConsole, openPage, signIn, type ConsoleInBrowser } from "../support/browser.ts";

describe("every page", () => {
  let opened: ConsoleInBrowser;
  beforeAll(async () => {
    opened = await openConsole();
    await recordOutage(opened.service.deps, opened.admin);
  });
  afterAll(() => opened.close());

  const atRest = "Cautions";
  const guide = ["/guide", ...guidePages.map(({ slug }) => `/guide/${slug}`)];

  it.each(["/sign-in", "/invitation#token=not-used", "/invitation", "/nowhere"])(
    "%s asks nothing of another origin and breaks no policy, for a stranger",
    async (path) => {
      const { page, misdeeds } = await openPage(opened.browser, opened.service.url);
      await page.goto(opened.service.url + path, { waitUntil: "networkidle" });
      await page.getByRole("region", { name: atRest, exact: true }).waitFor();
      expect(misdeeds).toEqual(noMisdeeds);
    },
  );

  it("lets a stranger read the whole guide, asks nothing of another origin and breaks no policy", async () => {
    const { page, misdeeds } = await openPage(opened.browser, opened.service.url);
    for (const path of guide) {
      await page.goto(opened.service.url + path, { waitUntil: "networkidle" });
      await page.getByRole("navigation", { name: "Guide", exact: true }).waitFor();
      expect([path, await page.getByRole("alert").count()]).toEqual([path, 0]);
      expect([path, await page.getByRole("link", { name: "Sign in", exact: true }).count()]).toEqual([
        path,
        1,
      ]);
    }
    expect(misdeeds).toEqual(noMisdeeds);
    await page.goto(`${opened.service.url}/guide/worked-example`);
    await page.getByRole("img", { name: /^Figure 2\. Plan and elevation/ }).waitFor();
    await page.goto(`${opened.service.url}/guide/codes#too_few_points`);
    await page.getByRole("link", { name: "too_few_points", exact: true }).click();
    await page.waitForURL(`${opened.service.url}/v1/problems/too_few_points`);
    expect(await page.getByRole("heading", { level: 1 }).innerText()).toBe("too_few_points");
  });

  it("asks nothing of another origin and breaks no policy, signed in", async () => {
    const { page, misdeeds } = await openPage(opened.browser, opened.service.url);
    await signIn(page, opened);
    const records = await recordPaths(page);
    expect(records.length).toBeGreaterThanOrEqual(6);
    const tried = Object.values(computations).map(({ resource }) => `/try?endpoint=${resource}`);
    const own = ["/", "/calculations?kind=bore-fit&status=failed", "/keys", "/self-test"];
    for (const path of [...own, ...tried, ...records]) {
      await page.goto(opened.service.url + path, { waitUntil: "networkidle" });
      await page.getByRole("heading", { level: 1 }).waitFor();
      if (path.startsWith("/calculations/")) await page.getByLabel("Title block", { exact: true }).waitFor();
      if (path.startsWith("/try")) {
        await page.getByRole("button", { name: "Send call", exact: true }).click();
        await page.getByText("201 Created").waitFor();
      }
      expect([path, misdeeds]).toEqual([path, noMisdeeds]);
    }
  });

  it.each([380, 768, 1280])("fits a window %d pixels wide without scrolling sideways", async (width) => {
    const { page } = await openPage(opened.browser, opened.service.url);
    await page.setViewportSize({ width, height: 800 });
    await signIn(page, opened);
    const records = await recordPaths(page);
    for (const path of ["/calculations", "/keys", "/webhooks", "/outbox", "/try", "/self-test", ...records]) {
      await page.goto(opened.service.url + path, { waitUntil: "networkidle" });
      await page.getByRole("heading", { level: 1 }).waitFor();
      const scrollWidth = await page.evaluate<number>("document.documentElement.scrollWidth");
      expect([path, scrollWidth]).toEqual([path, width]);
    }
  });

  it.each([1100, 1280, 1600])(
    "has its header in one row, %d pixels wide, for an administrator",
    async (width) => {
      const { page } = await openPage(opened.browser, opened.service.url);
      await page.setViewportSize({ width, height: 800 });
      await signIn(page, opened);
      const header = page.getByRole("banner");
      const inRow = [
        ...(await header.getByRole("link").all()),
        header.getByRole("button", { name: "Sign out" }),
      ];
      expect(inRow.length).toBeGreaterThanOrEqual(11);
      const boxes = await Promise.all(inRow.map((each) => each.boundingBox()));
      const middles = boxes.map((box) => (box ? box.y + box.height / 2 : Number.NaN));
      expect(Math.max(...middles) - Math.min(...middles)).toBeLessThan(4); // px
      const rights = boxes.map((box) => (box ? box.x + box.width : Number.NaN));
      expect(Math.max(...rights)).toBeLessThanOrEqual(width);
      const lefts = boxes.map((box) => box?.x ?? Number.NaN);
      expect(lefts.slice(1).every((left, index) => left >= (rights[index] ?? Infinity))).toBe(true);
    },
  );

  it.each([380, 768, 1280])("fits the guide into a window %d pixels wide", async (width) => {
    const { page } = await openPage(opened.browser, opened.service.url);
    await page.setViewportSize({ width, height: 800 });
    for (const path of guide) {
      await page.goto(opened.service.url + path, { waitUntil: "networkidle" });
      await page.getByRole("heading", { level: 1 }).waitFor();
      const scrollWidth = await page.evaluate<number>("document.documentElement.scrollWidth");
      expect([path, scrollWidth]).toEqual([path, width]);
    }
  });

  it("is signed in again after a reload, and signed out for good when asked", async () => {
    const { page } = await openPage(opened.browser, opened.service.url);
    await signIn(page, opened);
    await page.reload();
    await page.getByText("Maren Oake, admin").waitFor();
    await page.getByRole("button", { name: "Sign out", exact: true }).click();
    await page.getByRole("heading", { level: 1, name: "Sign in", exact: true }).waitFor();
    await page.goto(`${opened.service.url}/keys`);
    await page.getByLabel("Password", { exact: true }).waitFor();
    expect(new URL(page.url()).pathname).toBe("/sign-in");
  });

  it("puts the last filters back with the back button", async () => {
    const { page } = await openPage(opened.browser, opened.service.url);
    await signIn(page, opened);
    await page.getByLabel("Kind", { exact: true }).selectOption("shim-move");
    await page.getByRole("button", { name: "Apply filters", exact: true }).click();
    await page.waitForURL(/kind=shim-move/);
    await page.getByRole("link", { name: "Shim moves", exact: true }).first().click();
    await page.getByLabel("Title block", { exact: true }).waitFor();
    await page.goBack();
    await page.getByRole("heading", { level: 1, name: "Calculations", exact: true }).waitFor();
    expect(await page.getByLabel("Kind", { exact: true }).inputValue()).toBe("shim-move");
    await page.goBack();
    await page.waitForURL((url) => url.search === "");
    expect(await page.getByLabel("Kind", { exact: true }).inputValue()).toBe("");
  });

  it("prints a record as a sheet without the console round it", async () => {
    const { page } = await openPage(opened.browser, opened.service.url);
    await signIn(page, opened);
    await page.getByRole("link", { name: "Axis and deviations", exact: true }).first().click();
    await page.getByLabel("Title block", { exact: true }).waitFor();
    await page.emulateMedia({ media: "print" });
    expect(await page.getByRole("navigation", { name: "Main", exact: true }).isVisible()).toBe(false);
    expect(await page.getByRole("button", { name: "Replay record", exact: true }).isVisible()).toBe(false);
    expect(await page.getByLabel("Title block", { exact: true }).isVisible()).toBe(true);
    expect(await page.getByRole("region", { name: atRest, exact: true }).isVisible()).toBe(true);
    expect(await page.locator("svg.figure-printed").isVisible()).toBe(true);
    const pdf = await page.pdf({ preferCSSPageSize: true });
    expect(pdf.subarray(0, 5).toString()).toBe("%PDF-");
  });
});

/** Where the records of the list stand. */
async function recordPaths(page: Page): Promise<string[]> {
  await page.getByRole("table").waitFor();
  const links = await page.getByRole("row").getByRole("link").all();
  const paths = await Promise.all(links.map((link) => link.getAttribute("href")));
  return paths.flatMap((path) => path ?? []);
}
