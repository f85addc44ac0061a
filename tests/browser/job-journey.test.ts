import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { fellgateDocument } from "../../server/demo/fellgate-document.ts";
import { asFoundReadings } from "../../server/demo/fellgate-job.ts";
import { setUpChecks } from "../../shared/set-up-checks.ts";
import { noMisdeeds, openConsole, openPage, signIn, type ConsoleInBrowser } from "../support/browser.ts";
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

    await page.getByRole("link", { name: "Machines" }).click();
    await page.getByRole("link", { name: "Describe a machine" }).first().click();
    await page.getByLabel("JSON file").setInputFiles({
      name: "unit-2.json",
      mimeType: "application/json",
      buffer: Buffer.from(JSON.stringify(fellgateDocument)),
    });
    await page.getByRole("button", { name: "Store machine" }).click();
    await page.getByRole("heading", { level: 1, name: fellgateDocument.name }).waitFor();
    await page.getByRole("table", { name: "Stations" }).waitFor();

    await page.getByRole("link", { name: "Start a job" }).click();
    await page.getByRole("heading", { level: 1, name: "Start a job" }).waitFor();
    await page.getByLabel("Title", { exact: true }).fill("Unit 2, major outage");
    await page.getByLabel("Id, instrument 1").fill("gauge-1");
    await page.getByLabel("Description, instrument 1").fill("Turned bore gauge");
    await page.getByLabel("u of a reading, instrument 1").fill("0,008");
    await page.getByRole("button", { name: "Start job" }).click();
    await page.getByRole("heading", { level: 1, name: "Unit 2, major outage" }).waitFor();

    const checks = page.getByRole("region", { name: "Set-up checks" });
    for (const { text } of setUpChecks) {
      await checks.getByRole("group", { name: text }).getByRole("button", { name: "yes" }).click();
      await checks.getByRole("listitem").filter({ hasText: text }).getByText("yes, Maren Oake").waitFor();
    }
    expect(await checks.getByText("not answered").count()).toBe(0);

    await page.getByText("Open a survey", { exact: true }).click();
    await page.getByRole("button", { name: "Open survey" }).click();
    const survey = page.getByRole("region", { name: "Survey 1, as found" });
    await survey.getByText("Upload a file of readings").click();
    const readings = asFoundReadings();
    await survey.getByLabel("File of readings, CSV or XLSX").setInputFiles({
      name: "as-found.csv",
      mimeType: "text/csv",
      buffer: Buffer.from(writeReadingsFile(readings)),
    });
    await survey.getByText(`decimal comma: ${readings.length} readings, 0 faults.`).waitFor();
    await survey.getByRole("button", { name: `Store ${readings.length} readings` }).click();
    await survey.getByRole("button", { name: "Compute survey" }).click();
    await survey.getByRole("table", { name: "Deviations as found" }).waitFor();
    await page.getByRole("img", { name: "Figure 2. Plan and elevation" }).waitFor();

    const plan = page.getByRole("region", { name: "Plan", exact: true });
    await plan.getByText("Plan moves", { exact: true }).first().click();
    await plan.getByRole("button", { name: "Plan moves" }).click();
    await plan.getByRole("table", { name: "Moves at the supports" }).waitFor();

    const [saved] = await Promise.all([
      page.waitForEvent("download"),
      page.getByRole("button", { name: "Download report, Record (JSON)" }).click(),
    ]);
    expect(saved.suggestedFilename()).toMatch(/^job-.*-revision-1\.json$/);

    await page.setViewportSize({ width: 380, height: 800 });
    const job = new URL(page.url()).pathname;
    const machine = await page
      .getByRole("link", { name: fellgateDocument.name })
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
