import { configure } from "@testing-library/react";
import { afterEach, beforeEach } from "vitest";
import { restartSession } from "../lib/session-store.ts";

// Patient with a machine that has other work; a failure says what was not found, not the whole page.
configure({ asyncUtilTimeout: 6_000, getElementError: (message) => new Error(message ?? "Not found.") });

/** What the tests' page lacks and every browser has. */
Object.assign(HTMLDialogElement.prototype, {
  showModal(this: HTMLDialogElement) {
    this.open = true;
  },
  close(this: HTMLDialogElement) {
    this.open = false;
  },
});
Element.prototype.scrollIntoView = () => undefined;
window.scrollTo = () => undefined;
Object.defineProperty(window, "isSecureContext", { value: true });

beforeEach(() => {
  restartSession();
  sessionStorage.clear();
  localStorage.clear();
});
afterEach(() => {
  delete document.documentElement.dataset["theme"];
});
