import { afterAll, beforeAll, describe, expect, it } from "vitest";
import {
  headingOf,
  noMisdeeds,
  openConsole,
  openPage,
  signIn,
  type ConsoleInBrowser,
} from "../support/browser.ts";
import { makeOrganisation } from "../support/factories.ts";
import { JobDriver, signingPassword } from "../support/fellgate-job.ts";

describe("a job signed in the console", () => {
  let opened: ConsoleInBrowser;
  let job: JobDriver;
  beforeAll(async () => {
    opened = await openConsole();
    job = new JobDriver(opened.service, await makeOrganisation(opened.service.deps));
    await job.givePassword();
    await job.runToSignature();
  });
  afterAll(() => opened.close());

  it("refuses a wrong password and loses nothing, then is frozen with its hash, and corrected as a new revision", async () => {
    const { page, misdeeds } = await openPage(opened.browser, opened.service.url);
    await signIn(page, opened, job.works.members.engineer.email);
    await page.goto(`${opened.service.url}/jobs/${job.id}`);
    await headingOf(page, "Unit 2, major outage");
    await page.getByText("Nothing stands in the way.", { exact: true }).waitFor();

    const meaning = "As-left condition reviewed and accepted.";
    const signature = page.getByRole("region", { name: "Signature", exact: true });
    await signature.getByRole("button", { name: "Sign job", exact: true }).click();
    const dialog = page.getByRole("dialog", { name: "Sign this job?", exact: true });
    await dialog.getByLabel("What your signature says", { exact: true }).fill(meaning);
    const password = dialog.getByLabel("Your password", { exact: true });
    await password.fill("another long sentence");
    await dialog.getByRole("button", { name: "Sign job", exact: true }).click();
    const alert = dialog.getByRole("alert");
    await alert.waitFor();
    expect(await alert.innerText()).toContain("The job is not signed.");
    expect(await password.getAttribute("aria-invalid")).toBe("true");
    expect(await dialog.innerText()).toContain("This is not the password you sign in with.");
    expect(await dialog.getByLabel("What your signature says", { exact: true }).inputValue()).toBe(meaning);
    expect((await job.read()).state).toBe("open");

    await password.fill(signingPassword);
    await dialog.getByRole("button", { name: "Sign job", exact: true }).click();
    const signed = page.getByRole("region", { name: "Signed", exact: true });
    await signed.waitFor();
    expect(await signed.innerText()).toContain(meaning);
    const first = (await job.read()).signature;
    expect(first?.recordHash).toMatch(/^sha256:[0-9a-f]{64}$/);
    const block = page.getByLabel("Title block", { exact: true });
    expect(await block.innerText()).toContain(first?.recordHash);
    expect(await block.innerText()).toContain(`The engineer: ${meaning}`);
    expect(await page.content()).not.toContain(signingPassword);
    for (const name of [
      /^Sign job$/,
      /^Withdraw/,
      /^Add/,
      /^Compute/,
      /^Plan/,
      /^Log move$/,
      /^Send reading$/,
    ]) {
      expect([name, await page.getByRole("button", { name }).count()]).toEqual([name, 0]);
    }
    const late = await job.post(`/v1/jobs/${job.id}/comments`, { text: "Too late." });
    expect([late.status, late.body["code"]]).toEqual([409, "job_signed"]);

    const reason = "The aft clearance was written down of another machine.";
    await signed.getByRole("button", { name: "Open a new revision", exact: true }).click();
    const question = page.getByRole("dialog", { name: "Open a new revision?", exact: true });
    await question.getByLabel("Reason", { exact: true }).fill(reason);
    await question.getByRole("button", { name: "Open revision", exact: true }).click();
    const revisions = page.getByRole("navigation", { name: "Revisions of the job", exact: true });
    await revisions.getByText(reason, { exact: false }).waitFor();
    await page.getByText("Nothing stands in the way.", { exact: true }).waitFor();
    expect((await job.read()).revision).toBe(2);

    await revisions.getByRole("link", { name: "Revision 1", exact: true }).click();
    await signed.waitFor();
    expect(await block.innerText()).toContain(first?.recordHash);
    expect(await page.getByRole("button", { name: "Open a new revision", exact: true }).count()).toBe(0);
    expect(misdeeds).toEqual(noMisdeeds);
  });
});
