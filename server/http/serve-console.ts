import { existsSync } from "node:fs";
import { fileURLToPath } from "node:url";
import express, { Router } from "express";

const dist = fileURLToPath(new URL("../../console/dist/", import.meta.url));
const page = `${dist}index.html`;

/** The built console. Its pages' addresses all serve the one page; its hashed assets may be kept for ever. */
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
    const isPage = !request.path.includes(".") && !/^\/(v\d+|docs)(\/|$)/.test(request.path);
    if (!isPage || !request.accepts("html") || !existsSync(page)) {
      next();
      return;
    }
    response.locals.route = "/console";
    response.set("Cache-Control", "no-cache").sendFile(page);
  });
  return router;
}
