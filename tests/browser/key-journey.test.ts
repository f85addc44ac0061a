import { afterAll, beforeAll, describe, expect, it } from "vitest";
import {
  goTo,
  headingOf,
  noMisdeeds,
  openConsole,
  openPage,
  signIn,
  type ConsoleInBrowser,
} from "../support/browser.ts";
import { smallBoreFit } from "../support/factories.ts";

describe("a key, from its issue to its end", () => {
  let opened: ConsoleInBrowser;
  beforeAll(async () => {
    opened = await openConsole();
  });
  afterAll(() => opened.close());

  const fit = (key: string) =>
    fetch(`${opened.service.url}/v1/bore-fits`, {
      method: "POST",
      headers: { Authorization: `Bearer ${key}`, "Content-Type": "application/json" },
      body: JSON.stringify({ ...smallBoreFit, note: "Sent with the key" }),
    });

  it("is issued in the console, used, found again in the record, replayed, revoked and refused", async () => {
    const { page, misdeeds } = await openPage(opened.browser, opened.service.url);
    await signIn(page, opened);

    await goTo(page, "Keys");
    await page.getByRole("button", { name: "Issue key", exact: true }).click();
    const form = page.getByRole("dialog", { name: "Issue key", exact: true });
    await form.getByLabel("Name", { exact: true }).fill("Outage planning");
    await form.getByRole("button", { name: "Issue key", exact: true }).click();
    const issued = page.getByRole("dialog", { name: "Key issued", exact: true });
    const key = await issued.getByTestId("secret").innerText();
    expect(key).toMatch(/^bw_live_/);
    await page.keyboard.press("Escape");
    expect(await issued.isVisible()).toBe(true);
    await issued.getByRole("button", { name: "I have copied it", exact: true }).click();
    await page.getByRole("row", { name: /Outage planning.*active/ }).waitFor();
    expect(await page.content()).not.toContain(key);

    const made = await fit(key);
    expect(made.status).toBe(201);
    const { id } = (await made.json()) as { id: string };

    await goTo(page, "Calculations");
    const row = page.getByRole("row", { name: new RegExp(id) });
    expect(await row.innerText()).toContain("key Outage planning");
    await row.getByRole("link", { name: "Bore fit", exact: true }).click();
    await page.getByRole("img", { name: "Figure 1. Bore section brg-1", exact: true }).waitFor();
    expect(new URL(page.url()).pathname).toBe(`/calculations/${id}`);
    const block = page.getByLabel("Title block", { exact: true });
    for (const words of ["Fellgate Works", id, "key Outage planning", "Sent with the key"]) {
      expect(await block.innerText()).toContain(words);
    }
    await page.getByRole("button", { name: "Replay record", exact: true }).click();
    await page.getByText(/^same: Engine .* answers exactly what is stored/).waitFor();

    await goTo(page, "Keys");
    await page.getByRole("button", { name: "Revoke key Outage planning", exact: true }).click();
    const question = page.getByRole("dialog", { name: /Revoke key/ });
    expect((await fit(key)).status).toBe(201);
    await question.getByRole("button", { name: "Revoke key", exact: true }).click();
    await page.getByRole("row", { name: /Outage planning.*revoked/ }).waitFor();

    const asked = Date.now();
    let status = 201;
    while (status === 201 && Date.now() - asked < 1_000) status = (await fit(key)).status;
    expect(status).toBe(401);
    expect(((await (await fit(key)).json()) as { code: string }).code).toBe("key_revoked");
    expect(misdeeds).toEqual(noMisdeeds);
  });

  it("goes through with the keyboard alone", async () => {
    const { page } = await openPage(opened.browser, opened.service.url);
    await page.goto(`${opened.service.url}/keys`);
    const focused = () => page.locator(":focus");
    await page.getByLabel("E-mail", { exact: true }).waitFor();
    await page.keyboard.type(opened.admin.member.email);
    await page.keyboard.press("Tab");
    await page.keyboard.type("a long and private sentence");
    await page.keyboard.press("Enter");
    await headingOf(page, "Keys");
    const tabTo = async (name: string) => {
      for (let presses = 0; presses < 40; presses += 1) {
        await page.keyboard.press("Tab");
        if ((await focused().innerText()) === name) return;
      }
      throw new Error(`Tab does not reach "${name}".`);
    };
    await tabTo("Issue key");
    await page.keyboard.press("Enter");
    await page.getByRole("dialog", { name: "Issue key", exact: true }).waitFor();
    await page.keyboard.type("By keyboard");
    await page.keyboard.press("Enter");
    await page.getByRole("dialog", { name: "Key issued", exact: true }).waitFor();
    await tabTo("I have copied it");
    await page.keyboard.press("Enter");
    await page.getByRole("row", { name: /By keyboard.*active/ }).waitFor();
    expect(await focused().innerText()).toBe("Issue key");
  });
});
