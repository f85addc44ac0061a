import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { asFoundReadings } from "../../server/demo/fellgate-job.ts";
import { decimalsAcross, writeSigned } from "../../shared/figures/write-number.ts";
import {
  goTo,
  headingOf,
  noMisdeeds,
  openConsole,
  openPage,
  signIn,
  type ConsoleInBrowser,
} from "../support/browser.ts";
import { makeOrganisation } from "../support/factories.ts";
import { JobDriver } from "../support/fellgate-job.ts";

describe("a move followed in the console", () => {
  let opened: ConsoleInBrowser;
  let job: JobDriver;
  let plan: string;
  beforeAll(async () => {
    opened = await openConsole();
    job = new JobDriver(opened.service, await makeOrganisation(opened.service.deps));
    await job.givePassword();
    await job.start();
    const found = await job.survey("as_found", asFoundReadings());
    plan = await job.add("/plans", { survey: found });
  });
  afterAll(() => opened.close());

  const component = "compressor-casing";
  const send = async (body: object) => {
    const at = new Date().toISOString();
    const { status } = await job.post(`/v1/jobs/${job.id}/indications`, { plan, component, at, ...body });
    expect(status).toBe(201);
  };

  it("changes on an open page with every reading that is posted, and takes one by its own form", async () => {
    const { page, misdeeds } = await openPage(opened.browser, opened.service.url);
    await signIn(page, opened, job.works.members.engineer.email);
    await page.goto(`${opened.service.url}/jobs/${job.id}`);
    const follow = page.getByRole("region", { name: "Follow a move", exact: true });
    await follow.getByLabel("Step of the plan", { exact: true }).selectOption(component);
    const left = follow.getByRole("table", { name: "Left to move: + right, + up", exact: true });
    const record = await job.read();
    const planned = record.plans[0]?.result.components.find(({ id }) => id === component)?.realised ?? [];
    const decimals = decimalsAcross("mm");
    const [first] = planned;
    expect(await left.getByRole("row").nth(1).innerText()).toContain(writeSigned(first?.v ?? 0, decimals));

    await follow.getByRole("button", { name: "Follow live", exact: true }).click();
    await follow.getByText("live", { exact: true }).waitFor();
    // An indicator right above a support tells what is left there in v, and nothing of h: from the plan, by hand.
    const support = record.machine.components
      ?.find(({ id }) => id === component)
      ?.supports?.find(({ id }) => id === first?.support);
    const above = record.machine.indicators?.find(({ z, clockDeg }) => z === support?.z && clockDeg === 0);
    for (const reading of [0.05, 0.1]) {
      await send({ indicators: [{ id: above?.id, reading }] });
      const rest = writeSigned((first?.v ?? 0) - reading, decimals);
      await left.getByRole("row").nth(1).getByText(rest, { exact: true }).waitFor();
    }
    await follow.getByText("Nothing in these readings says stop.", { exact: false }).waitFor();

    const fit = record.surveys[0]?.result?.fits.find(({ id }) => id === "brg-1");
    const centre = { h: fit?.centre.h ?? 0, v: (fit?.centre.v ?? 0) + 0.05 };
    await send({ sights: [{ station: "brg-1", centre }] });
    await follow.getByText("brg-1 has moved more than it may.", { exact: true }).waitFor();
    expect(await follow.getByText("neighbour_passed", { exact: true }).count()).toBe(1);
    await follow.getByRole("row", { name: /^brg-1 passed its limit/ }).waitFor();

    await follow.getByText("Enter a reading", { exact: true }).click();
    await follow.getByLabel("brg-1 h", { exact: true }).fill(String(fit?.centre.h ?? 0));
    await follow.getByLabel("brg-1 v", { exact: true }).fill(String(fit?.centre.v ?? 0));
    await follow.getByRole("button", { name: "Send reading", exact: true }).click();
    await follow.getByRole("row", { name: /^brg-1 within/ }).waitFor();
    expect(await follow.getByText("brg-1 has moved more than it may.", { exact: true }).count()).toBe(0);

    await page.setViewportSize({ width: 380, height: 800 });
    expect(await page.evaluate<number>("document.documentElement.scrollWidth")).toBe(380);
    const ended = page.waitForEvent("requestfailed", (request) => request.url().endsWith("/events"));
    await goTo(page, "Machines");
    await ended;
    expect(misdeeds).toEqual(noMisdeeds);
  });

  it("can be watched and not entered by who may only read", async () => {
    const { page } = await openPage(opened.browser, opened.service.url);
    const { viewer, engineer } = job.works.members;
    await viewer.update({ passwordHash: engineer.passwordHash });
    await signIn(page, opened, viewer.email);
    await page.goto(`${opened.service.url}/jobs/${job.id}`);
    await headingOf(page, "Unit 2, major outage");
    const follow = page.getByRole("region", { name: "Follow a move", exact: true });
    await follow.getByText(/^You may follow a move and not enter readings/).waitFor();
    await follow.getByRole("button", { name: "Show earlier readings", exact: true }).click();
    await follow
      .getByRole("row", { name: /brg-1 h/ })
      .first()
      .waitFor();
    expect(await follow.getByText("Enter a reading", { exact: true }).count()).toBe(0);
  });
});
