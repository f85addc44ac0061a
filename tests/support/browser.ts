import { chromium, type Browser, type Page } from "playwright-core";
import type { Environment } from "../../server/config.ts";
import { createMembers } from "../../server/services/first-admin.ts";
import { findProgram } from "../../server/bootstrap/find-program.mjs";
import type { Caller } from "../../server/services/caller.ts";
import { openListeningApp, type ListeningApp } from "./listening-app.ts";

export const password = "a long and private sentence";

/** The service with an administrator who can sign in, and a browser. */
export interface ConsoleInBrowser {
  readonly service: ListeningApp;
  readonly browser: Browser;
  readonly admin: Caller & { readonly by: "member" };
  close(): Promise<void>;
}

export async function openConsole(environment: Environment = {}): Promise<ConsoleInBrowser> {
  const service = await openListeningApp(environment);
  const email = "admin@fellgate.example";
  const name = "Fellgate Works";
  const made = await createMembers(service.deps, { name }, [
    { email, name: "Maren Oake", role: "admin", password },
  ]);
  const [member] = made.members;
  if (!member) throw new Error("The administrator was not made.");
  const browser = await launchBrowser();
  return {
    service,
    browser,
    admin: {
      by: "member",
      organisation: { id: made.organisationId, name },
      member: { id: member.id, name: member.name, email, role: "admin" },
      sessionId: "",
    },
    close: async () => {
      await browser.close();
      await service.close();
    },
  };
}

function launchBrowser(): Promise<Browser> {
  const executablePath = findProgram("chromium");
  if (executablePath === null) throw new Error("Chromium is missing: install Debian's package chromium.");
  // Tests run as root in a container too, where the sandbox cannot start; the pages are our own.
  return chromium.launch({
    executablePath,
    headless: true,
    args: ["--no-sandbox", "--disable-dev-shm-usage"],
  });
}

/** What a page did that it must not do. */
export interface Misdeeds {
  /** Addresses asked for outside the service. */
  readonly elsewhere: string[];
  /** Directives of the content security policy that were broken. */
  readonly violations: string[];
  /** Errors in the console, without answers of the service that the page shows itself. */
  readonly errors: string[];
}

/** A page of its own, whose misdeeds are written down. */
export async function openPage(
  browser: Browser,
  origin: string,
): Promise<{ page: Page; misdeeds: Misdeeds }> {
  const context = await browser.newContext({ viewport: { width: 1280, height: 900 } });
  const page = await context.newPage();
  page.setDefaultTimeout(30_000);
  const misdeeds: Misdeeds = { elsewhere: [], violations: [], errors: [] };
  context.on("request", (request) => {
    const url = new URL(request.url());
    if (url.protocol !== "data:" && url.origin !== origin) misdeeds.elsewhere.push(url.href);
  });
  page.on("console", (message) => {
    // A refusal such as 401 before the sign-in is an answer that the page deals with.
    if (message.type() === "error" && !/status of 4\d\d/.test(message.text()))
      misdeeds.errors.push(message.text());
  });
  page.on("pageerror", (error) => misdeeds.errors.push(String(error)));
  await page.exposeFunction("writeDownViolation", (directive: string) => misdeeds.violations.push(directive));
  await page.addInitScript({
    content: `document.addEventListener("securitypolicyviolation", (event) =>
      window.writeDownViolation(event.effectiveDirective + " " + event.blockedURI));`,
  });
  return { page, misdeeds };
}

export const noMisdeeds: Misdeeds = { elsewhere: [], violations: [], errors: [] };

/** Who signs in: the administrator of the console, or another of its members. */
export async function signIn(
  page: Page,
  { service, admin }: ConsoleInBrowser,
  email = admin.member.email,
): Promise<void> {
  await page.goto(`${service.url}/`);
  await page.getByLabel("E-mail", { exact: true }).fill(email);
  await page.getByLabel("Password", { exact: true }).fill(password);
  await page.getByRole("button", { name: "Sign in", exact: true }).click();
  await headingOf(page, "Calculations");
}

/** Waits for a page's own heading: until it is there, what is found may still stand on the page before. */
export async function headingOf(page: Page, name: string): Promise<void> {
  await page.getByRole("heading", { level: 1, name, exact: true }).waitFor();
}

/** Goes to a page by the navigation that stands on each. */
export async function goTo(page: Page, name: string): Promise<void> {
  const main = page.getByRole("navigation", { name: "Main", exact: true });
  await main.getByRole("link", { name, exact: true }).click();
  await headingOf(page, name);
}
