import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { sendMail } from "../../server/mail/send-mail.ts";
import {
  goTo,
  noMisdeeds,
  openConsole,
  openPage,
  signIn,
  type ConsoleInBrowser,
} from "../support/browser.ts";
import { localWebhooks } from "../support/webhook-driver.ts";
import { WebhookReceiver } from "../support/webhook-receiver.ts";

describe("a webhook, from its making to its end", () => {
  let opened: ConsoleInBrowser;
  let receiver: WebhookReceiver;
  beforeAll(async () => {
    opened = await openConsole(localWebhooks);
    receiver = await new WebhookReceiver().open();
  });
  afterAll(async () => {
    receiver.close();
    await opened.close();
  });

  it("is added in the console, tested, found in its log, given a new secret, switched off and removed", async () => {
    const { page, misdeeds } = await openPage(opened.browser, opened.service.url);
    await signIn(page, opened);
    await goTo(page, "Webhooks");
    await page.getByRole("button", { name: "Add webhook", exact: true }).click();
    const form = page.getByRole("dialog", { name: "Add webhook", exact: true });
    await form.getByLabel("Name", { exact: true }).fill("Outage planner");
    await form.getByLabel("Address", { exact: true }).fill("https://10.0.0.1/hook");
    await form.getByRole("checkbox", { name: /A job was signed/ }).check();
    await form.getByRole("button", { name: "Add webhook", exact: true }).click();
    await form
      .getByText(/not on the public network/)
      .first()
      .waitFor();
    await form.getByLabel("Address", { exact: true }).fill(receiver.url);
    await form.getByRole("button", { name: "Add webhook", exact: true }).click();
    const added = page.getByRole("dialog", { name: "Webhook added", exact: true });
    const secret = await added.getByTestId("secret").innerText();
    await added.getByRole("button", { name: "I have copied it", exact: true }).click();
    expect(await page.content()).not.toContain(secret);

    await page.getByRole("link", { name: "Outage planner", exact: true }).click();
    await page.getByRole("button", { name: "Send a test", exact: true }).click();
    await page.getByText(/^The test arrived: answered 204 in \d+ ms\.$/).waitFor();
    expect(receiver.received[0]?.signedWith(secret)).toBe(true);
    const row = page.getByRole("row", { name: /webhook\.test.*delivered/s });
    await row.getByRole("button", { name: "Deliver webhook.test again", exact: true }).click();
    await page.getByRole("row", { name: /webhook\.test.*waits/s }).waitFor();

    await page.getByRole("button", { name: "Replace secret", exact: true }).click();
    await page.getByRole("dialog").getByRole("button", { name: "Replace secret", exact: true }).click();
    const replaced = page.getByRole("dialog", { name: "Secret replaced", exact: true });
    expect(await replaced.getByTestId("secret").innerText()).not.toBe(secret);
    await replaced.getByRole("button", { name: "I have copied it", exact: true }).click();

    await page.getByRole("button", { name: "Switch off", exact: true }).click();
    await page.getByRole("button", { name: "Switch on", exact: true }).waitFor();
    await page.getByRole("button", { name: "Remove webhook", exact: true }).click();
    await page.getByRole("dialog").getByRole("button", { name: "Remove webhook", exact: true }).click();
    await page.getByText("No webhooks yet").waitFor();
    expect(misdeeds).toEqual(noMisdeeds);
  });

  it("and the mail that was kept is listed and downloaded by an administrator", async () => {
    const { organisation } = opened.admin;
    const mail = { to: ["owner@fellgate.example"], subject: "Report of unit 2 – as left", text: "See it." };
    await sendMail(opened.service.deps, { organisationId: organisation.id, ...mail });
    const { page, misdeeds } = await openPage(opened.browser, opened.service.url);
    await signIn(page, opened);
    await goTo(page, "Outbox");
    const row = page.getByRole("row", { name: /Report of unit 2 – as left/ });
    expect(await row.innerText()).toContain("owner@fellgate.example");
    const saved = page.waitForEvent("download");
    await row.getByRole("button", { name: /^Download/ }).click();
    expect((await saved).suggestedFilename()).toMatch(/\.eml$/);
    expect(misdeeds).toEqual(noMisdeeds);
  });
});
