import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { fellgateDocument } from "../../server/demo/fellgate-document.ts";
import { asFoundReadings } from "../../server/demo/fellgate-job.ts";
import { setUpChecks } from "../../shared/set-up-checks.ts";
import {
  goTo,
  headingOf,
  noMisdeeds,
  openConsole,
  openPage,
  signIn,
  type ConsoleInBrowser,
} from "../support/browser.ts";
import { writeReadingsFile } from "../support/readings-file.ts";

describe("a job in the console", () => {
  let opened: ConsoleInBrowser;
  beforeAll(async () => {
    opened = await openConsole();
  });
  afterAll(() => opened.close());

  it("goes from a machine's file over checks and a file of readings to a plan", async () => {
    const { page, misdeeds } = await openPage(opened.browser, opened.service.url);
    await signIn(page, opened);

    await goTo(page, "Machines");
    await page.getByRole("link", { name: "Describe a machine", exact: true }).first().click();
    await page.getByLabel("JSON file", { exact: true }).setInputFiles({
      name: "unit-2.json",
      mimeType: "application/json",
      buffer: Buffer.from(JSON.stringify(fellgateDocument)),
    });
    await page.getByRole("button", { name: "Store machine", exact: true }).click();
    await headingOf(page, fellgateDocument.name);
    await page.getByRole("table", { name: "Stations", exact: true }).waitFor();

    await page.getByRole("link", { name: "Start a job", exact: true }).click();
    await headingOf(page, "Start a job");
    await page.getByLabel("Title", { exact: true }).fill("Unit 2, major outage");
    await page.getByLabel("Id, instrument 1", { exact: true }).fill("gauge-1");
    await page.getByLabel("Description, instrument 1", { exact: true }).fill("Turned bore gauge");
    await page.getByLabel("u of a reading, instrument 1", { exact: true }).fill("0,008");
    await page.getByRole("button", { name: "Start job", exact: true }).click();
    await headingOf(page, "Unit 2, major outage");

    const checks = page.getByRole("region", { name: "Set-up checks", exact: true });
    for (const { text } of setUpChecks) {
      await checks
        .getByRole("group", { name: text, exact: true })
        .getByRole("button", { name: "yes", exact: true })
        .click();
      await checks.getByRole("listitem").filter({ hasText: text }).getByText("yes, Maren Oake").waitFor();
    }
    expect(await checks.getByText("not answered").count()).toBe(0);

    await page.getByText("Open a survey", { exact: true }).click();
    await page.getByRole("button", { name: "Open survey", exact: true }).click();
    const survey = page.getByRole("region", { name: "Survey 1, as found", exact: true });
    await survey.getByText("Upload a file of readings").click();
    const readings = asFoundReadings();
    await survey.getByLabel("File of readings, CSV or XLSX", { exact: true }).setInputFiles({
      name: "as-found.csv",
      mimeType: "text/csv",
      buffer: Buffer.from(writeReadingsFile(readings)),
    });
    await survey.getByText(`decimal comma: ${readings.length} readings, 0 faults.`).waitFor();
    await survey.getByRole("button", { name: `Store ${readings.length} readings`, exact: true }).click();
    await survey.getByRole("button", { name: "Compute survey", exact: true }).click();
    await survey.getByRole("table", { name: "Deviations as found", exact: true }).waitFor();
    await page.getByRole("img", { name: "Figure 2. Plan and elevation", exact: true }).waitFor();

    const plan = page.getByRole("region", { name: "Plan", exact: true });
    await plan.getByText("Plan moves", { exact: true }).first().click();
    await plan.getByRole("button", { name: "Plan moves", exact: true }).click();
    await plan.getByRole("table", { name: "Moves at the supports", exact: true }).waitFor();

    const [saved] = await Promise.all([
      page.waitForEvent("download"),
      page.getByRole("button", { name: "Download report, Record (JSON)", exact: true }).click(),
    ]);
    expect(saved.suggestedFilename()).toMatch(/^job-.*-revision-1\.json$/);

    await page.setViewportSize({ width: 380, height: 800 });
    const job = new URL(page.url()).pathname;
    const machine = await page
      .getByRole("link", { name: fellgateDocument.name, exact: true })
      .first()
      .getAttribute("href");
    const own = [`${machine}`, `${machine}/edit`, `${machine}/history`];
    for (const path of [job, "/jobs", "/jobs/new", "/machines", "/machines/new", ...own]) {
      await page.goto(opened.service.url + path, { waitUntil: "networkidle" });
      await page.getByRole("heading", { level: 1 }).waitFor();
      const scrollWidth = await page.evaluate<number>("document.documentElement.scrollWidth");
      expect([path, scrollWidth, misdeeds]).toEqual([path, 380, noMisdeeds]);
    }
  });
});
