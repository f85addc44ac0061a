import type { RequestHandler } from "express";
import { HttpProblem } from "../http/http-problem.ts";

/** Whatever no route took. */
export const notFound: RequestHandler = () => {
  throw new HttpProblem("not_found", "There is nothing at this address.");
};
