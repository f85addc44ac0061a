import type { RequestHandler } from "express";
import helmet from "helmet";
import type { Config } from "../config.ts";

/**
 * What a browser may do with our pages: run our own scripts and nothing else. Written out rather than helmet's default,
 * which would upgrade plain http on a site's own network to an https that is not there.
 */
const directives = {
  defaultSrc: ["'none'"],
  scriptSrc: ["'self'"],
  styleSrc: ["'self'"],
  fontSrc: ["'self'"],
  imgSrc: ["'self'", "data:"],
  connectSrc: ["'self'"],
  baseUri: ["'none'"],
  formAction: ["'self'"],
  frameAncestors: ["'none'"],
};

/** The docs page alone sets style attributes from its own script. */
const docsDirectives = { ...directives, styleSrc: ["'self'", "'unsafe-inline'"] };

export function securityHeaders({ publicUrl }: Pick<Config, "publicUrl">): RequestHandler {
  const strictTransportSecurity = publicUrl?.startsWith("https:") ? { maxAge: 31_536_000 } : false;
  const common = { strictTransportSecurity, crossOriginEmbedderPolicy: false } as const;
  const everywhere = helmet({ ...common, contentSecurityPolicy: { useDefaults: false, directives } });
  const docs = helmet({
    ...common,
    contentSecurityPolicy: { useDefaults: false, directives: docsDirectives },
  });
  return (request, response, next) =>
    (/^\/docs(\/|$)/.test(request.path) ? docs : everywhere)(request, response, next);
}
