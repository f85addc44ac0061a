import { render } from "@testing-library/react";
import { userEvent } from "@testing-library/user-event";
import { createMemoryRouter, RouterProvider } from "react-router-dom";
import { onTestFinished } from "vitest";
import type { Role } from "../../../shared/access.ts";
import { sessionSchema } from "../../../shared/schemas/sessions.ts";
import { AppProvider } from "../app/provider.tsx";
import { routes } from "../app/router.tsx";
import { shownMeta } from "../features/meta/api/get-meta.ts";
import { createQueryClient } from "../lib/query-client.ts";
import { answer, FakeService, refusal } from "./fake-service.ts";
import { sampleMeta, sampleSession } from "./samples.ts";

/** The whole console at an address, over a network of the test's own. Queries try again at once. */
export function renderConsole(address: string) {
  const router = createMemoryRouter(routes, { initialEntries: [address] });
  const queryClient = createQueryClient(1);
  onTestFinished(() => {
    queryClient.clear();
    router.dispose();
  });
  const view = render(
    <AppProvider queryClient={queryClient}>
      <RouterProvider router={router} />
    </AppProvider>,
  );
  return { ...view, router, user: userEvent.setup() };
}

/** A service at which a member of `role` is signed in already, by the cookie of an earlier visit. */
export function serviceFor(role: Role): FakeService {
  return new FakeService()
    .on("GET /v1/meta", answer(shownMeta, sampleMeta))
    .on("POST /v1/sessions/refresh", answer(sessionSchema, sampleSession(role)));
}

/** A service at which nobody is signed in. */
export function serviceForStranger(): FakeService {
  return new FakeService()
    .on("GET /v1/meta", answer(shownMeta, sampleMeta))
    .on("POST /v1/sessions/refresh", refusal("session_expired"));
}
