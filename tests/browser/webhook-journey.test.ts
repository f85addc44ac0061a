import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { sendMail } from "../../server/mail/send-mail.ts";
import { noMisdeeds, openConsole, openPage, signIn, type ConsoleInBrowser } from "../support/browser.ts";
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
    await page.getByRole("link", { name: "Webhooks" }).click();
    await page.getByRole("button", { name: "Add webhook" }).click();
    const form = page.getByRole("dialog", { name: "Add webhook" });
    await form.getByLabel("Name").fill("Outage planner");
    await form.getByLabel("Address").fill("https://10.0.0.1/hook");
    await form.getByRole("checkbox", { name: /A job was signed/ }).check();
    await form.getByRole("button", { name: "Add webhook" }).click();
    await form
      .getByText(/not on the public network/)
      .first()
      .waitFor();
    await form.getByLabel("Address").fill(receiver.url);
    await form.getByRole("button", { name: "Add webhook" }).click();
    const added = page.getByRole("dialog", { name: "Webhook added" });
    const secret = await added.getByTestId("secret").innerText();
    await added.getByRole("button", { name: "I have copied it" }).click();
    expect(await page.content()).not.toContain(secret);

    await page.getByRole("link", { name: "Outage planner" }).click();
    await page.getByRole("button", { name: "Send a test" }).click();
    await page.getByText(/^The test arrived: answered 204 in \d+ ms\.$/).waitFor();
    expect(receiver.received[0]?.signedWith(secret)).toBe(true);
    const row = page.getByRole("row", { name: /webhook\.test.*delivered/s });
    await row.getByRole("button", { name: "Deliver webhook.test again" }).click();
    await page.getByRole("row", { name: /webhook\.test.*waits/s }).waitFor();

    await page.getByRole("button", { name: "Replace secret" }).click();
    await page.getByRole("dialog").getByRole("button", { name: "Replace secret" }).click();
    const replaced = page.getByRole("dialog", { name: "Secret replaced" });
    expect(await replaced.getByTestId("secret").innerText()).not.toBe(secret);
    await replaced.getByRole("button", { name: "I have copied it" }).click();

    await page.getByRole("button", { name: "Switch off" }).click();
    await page.getByRole("button", { name: "Switch on" }).waitFor();
    await page.getByRole("button", { name: "Remove webhook" }).click();
    await page.getByRole("dialog").getByRole("button", { name: "Remove webhook" }).click();
    await page.getByText("No webhooks yet").waitFor();
    expect(misdeeds).toEqual(noMisdeeds);
  });

  it("and the mail that was kept is listed and downloaded by an administrator", async () => {
    const { organisation } = opened.admin;
    const mail = { to: ["owner@fellgate.example"], subject: "Report of unit 2 – as left", text: "See it." };
    await sendMail(opened.service.deps, { organisationId: organisation.id, ...mail });
    const { page, misdeeds } = await openPage(opened.browser, opened.service.url);
    await signIn(page, opened);
    await page.getByRole("link", { name: "Outbox" }).click();
    const row = page.getByRole("row", { name: /Report of unit 2 – as left/ });
    expect(await row.innerText()).toContain("owner@fellgate.example");
    const saved = page.waitForEvent("download");
    await row.getByRole("button", { name: /^Download/ }).click();
    expect((await saved).suggestedFilename()).toMatch(/\.eml$/);
    expect(misdeeds).toEqual(noMisdeeds);
  });
});
