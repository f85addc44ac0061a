import { availableParallelism } from "node:os";
import { fileURLToPath } from "node:url";
import react from "@vitejs/plugin-react";
import { defineConfig } from "vitest/config";
import { SummaryReporter } from "./support/summary-reporter.ts";

/** Two at least: much of a database test is waiting for the database. */
const parallelWorkers = Math.max(2, availableParallelism() - 1);
/** Generous: a test that hangs must fail, a slow machine must not. */
const seconds = (count: number): number => count * 1_000;
const database = ["tests/support/global-setup.ts"];

/** What starts whole processes runs after all else and one file at a time, so that its times mean something. */
const serial = (order: number) => ({ fileParallelism: false, sequence: { groupOrder: order } });

export default defineConfig({
  root: fileURLToPath(new URL("..", import.meta.url)),
  test: {
    maxWorkers: parallelWorkers,
    reporters: [["default", { summary: false }], new SummaryReporter()],
    projects: [
      {
        extends: true,
        test: {
          name: "unit",
          include: ["{server,shared,tests/support,tests/house,tests/golden}/**/*.test.ts"],
          setupFiles: ["tests/support/seeded-properties.ts"],
          testTimeout: seconds(20),
        },
      },
      {
        extends: true,
        test: {
          name: "api",
          include: ["tests/{api,db,openapi,reference,security,reliability,examples}/**/*.test.ts"],
          globalSetup: database,
          testTimeout: seconds(30),
          hookTimeout: seconds(60),
        },
      },
      {
        extends: true,
        plugins: [react()],
        test: {
          name: "console",
          include: ["console/src/**/*.test.{ts,tsx}", "tests/console/**/*.test.{ts,tsx}"],
          environment: "jsdom",
          setupFiles: [
            "tests/support/console-setup.ts",
            "tests/support/seeded-properties.ts",
            "console/src/testing/prepare-page.ts",
          ],
          testTimeout: seconds(20),
        },
      },
      {
        extends: true,
        test: {
          name: "browser",
          include: ["tests/browser/**/*.test.ts"],
          globalSetup: [...database, "tests/support/built-console.ts"],
          testTimeout: seconds(60),
          hookTimeout: seconds(60),
          ...serial(1),
        },
      },
      {
        extends: true,
        test: {
          name: "bootstrap",
          include: ["tests/bootstrap/**/*.test.ts"],
          testTimeout: seconds(90),
          hookTimeout: seconds(90),
          ...serial(2),
        },
      },
    ],
  },
});
