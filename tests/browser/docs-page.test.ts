import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { noMisdeeds, openConsole, openPage, type ConsoleInBrowser } from "../support/browser.ts";
import { issueKey } from "../../server/services/issue-key.ts";

describe("the docs page", () => {
  let opened: ConsoleInBrowser;
  let key: string;
  beforeAll(async () => {
    opened = await openConsole();
    const { secret } = await issueKey(
      opened.service.deps,
      { name: "Docs", scopes: ["calculations:write"] },
      { caller: opened.admin, claim: null, requestId: "test" },
    );
    key = secret;
  });
  afterAll(() => opened.close());

  it.each(["/docs", "/docs/"])(
    "at %s authorises with a key, tries a call out and shows its 201",
    async (path) => {
      const { page, misdeeds } = await openPage(opened.browser, opened.service.url);
      await page.goto(opened.service.url + path);
      const operation = page.locator(".opblock", { hasText: "/v1/bore-fits" }).first();
      await operation.waitFor();

      await page.getByRole("button", { name: "Authorize", exact: true }).first().click();
      const dialog = page.locator(".dialog-ux");
      await dialog.locator("input").first().fill(key);
      await dialog
        .getByRole("button", { name: /^(Apply credentials|Authorize)$/ })
        .first()
        .click();
      await dialog.getByRole("button", { name: "Close", exact: true }).first().click();

      await operation.locator(".opblock-summary-control").click();
      await operation.getByRole("button", { name: "Try it out", exact: true }).click();
      const body = operation.locator("textarea.body-param__text");
      expect(JSON.parse(await body.inputValue())).toHaveProperty("bores");
      await operation.getByRole("button", { name: "Execute", exact: true }).click();
      const answered = operation.locator(".live-responses-table tr.response .response-col_status").first();
      await answered.waitFor();
      expect(await answered.innerText()).toMatch(/^201/);
      expect(await operation.locator(".live-responses-table").innerText()).toContain('"kind": "bore-fit"');
      expect(misdeeds).toEqual(noMisdeeds);
    },
  );
});
