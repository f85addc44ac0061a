import { existsSync } from "node:fs";
import { fileURLToPath } from "node:url";
import express, { Router } from "express";

const dist = fileURLToPath(new URL("../../console/dist/", import.meta.url));
const page = `${dist}index.html`;

/** What is the API's own, however it is spelt: never a page. */
const notAPage = /^\/+(v\d+|docs)\b/i;

/**
 * The built console. The addresses of its pages all serve the one page, to whoever asks for a page by name: a program
 * that takes anything is told that there is nothing. Hashed assets may be kept for ever.
 */
export function serveConsole(): Router {
  const router = Router();
  router.use(
    "/assets",
    express.static(`${dist}assets`, { immutable: true, maxAge: "1y", index: false, redirect: false }),
  );
  router.use(
    express.static(dist, { index: false, redirect: false, cacheControl: false, dotfiles: "ignore" }),
  );
  router.get("/{*path}", (request, response, next) => {
    const isPage = !request.path.includes(".") && !notAPage.test(request.path);
    const wantsPage = request.path === "/" || (request.get("Accept") ?? "").includes("text/html");
    if (!isPage || !wantsPage || !existsSync(page)) {
      next();
      return;
    }
    response.locals.route = "/console";
    response.set("Cache-Control", "no-cache").sendFile(page);
  });
  return router;
}
