import type { RequestHandler } from "express";
import { HttpProblem } from "../http/http-problem.ts";
import { requestIdOf } from "./request-id.ts";
import { sendProblem } from "./error-handler.ts";

/**
 * Ends a call whose body has not arrived in time. Not left to the HTTP server, whose limit would also cut a body that is
 * meant to go on: readings streamed line by line.
 */
export function bodyDeadline(seconds: number): RequestHandler {
  return (request, response, next) => {
    const deadline = setTimeout(() => {
      if (response.headersSent) return;
      response.set("Connection", "close").once("finish", () => request.destroy());
      const problem = new HttpProblem("request_timeout", `The body did not arrive within ${seconds} s.`);
      sendProblem(response, problem, requestIdOf(response.locals), request.path);
    }, seconds * 1000);
    const settle = () => {
      clearTimeout(deadline);
    };
    request.once("end", settle).once("close", settle);
    response.once("close", settle);
    next();
  };
}
