import { createBrowserRouter, Navigate, type RouteObject } from "react-router-dom";
import { Skeleton } from "../components/ui/skeleton.tsx";
import { paths } from "../config/paths.ts";
import { guidePages } from "../features/guide/guide-pages.ts";
import { loadPage } from "../features/guide/load-page.ts";
import { RequireSession } from "../features/session/components/require-session.tsx";
import { SessionIfAny } from "../features/session/components/session-if-any.tsx";
import { Layout } from "./layout.tsx";
import { ErrorPage } from "./routes/error-page.tsx";
import { NotFoundPage } from "./routes/not-found-page.tsx";

/** Pages behind the sign-in. */
const memberPages: RouteObject[] = [
  { index: true, element: <Navigate to={paths.calculations} replace /> },
  {
    path: paths.calculations,
    lazy: async () => ({ Component: (await import("./routes/calculations-page.tsx")).CalculationsPage }),
  },
  {
    path: `${paths.calculations}/:id`,
    lazy: async () => ({ Component: (await import("./routes/calculation-page.tsx")).CalculationPage }),
  },
  {
    path: paths.machines,
    lazy: async () => ({ Component: (await import("./routes/machines-page.tsx")).MachinesPage }),
  },
  {
    path: paths.newMachine,
    lazy: async () => ({ Component: (await import("./routes/new-machine-page.tsx")).NewMachinePage }),
  },
  {
    path: `${paths.machines}/:id`,
    lazy: async () => ({ Component: (await import("./routes/machine-page.tsx")).MachinePage }),
  },
  {
    path: `${paths.machines}/:id/edit`,
    lazy: async () => ({ Component: (await import("./routes/edit-machine-page.tsx")).EditMachinePage }),
  },
  {
    path: `${paths.machines}/:id/history`,
    lazy: async () => ({ Component: (await import("./routes/machine-history-page.tsx")).MachineHistoryPage }),
  },
  {
    path: paths.jobs,
    lazy: async () => ({ Component: (await import("./routes/jobs-page.tsx")).JobsPage }),
  },
  {
    path: paths.newJob,
    lazy: async () => ({ Component: (await import("./routes/new-job-page.tsx")).NewJobPage }),
  },
  {
    path: `${paths.jobs}/:id`,
    lazy: async () => ({ Component: (await import("./routes/job-page.tsx")).JobPage }),
  },
  {
    path: paths.tryCall,
    lazy: async () => ({ Component: (await import("./routes/try-page.tsx")).TryPage }),
  },
  {
    path: paths.keys,
    lazy: async () => ({ Component: (await import("./routes/keys-page.tsx")).KeysPage }),
  },
  {
    path: paths.webhooks,
    lazy: async () => ({ Component: (await import("./routes/webhooks-page.tsx")).WebhooksPage }),
  },
  {
    path: `${paths.webhooks}/:id`,
    lazy: async () => ({ Component: (await import("./routes/webhook-page.tsx")).WebhookPage }),
  },
  {
    path: paths.outbox,
    lazy: async () => ({ Component: (await import("./routes/outbox-page.tsx")).OutboxPage }),
  },
  {
    path: paths.selfTest,
    lazy: async () => ({ Component: (await import("./routes/self-test-page.tsx")).SelfTestPage }),
  },
];

/** Pages that anybody may read; a member who does stays signed in. */
const openPages: RouteObject[] = [
  {
    path: paths.guide,
    lazy: async () => ({ Component: (await import("./routes/guide-page.tsx")).GuidePage }),
  },
  ...guidePages.map((page) => ({
    path: paths.guidePage(page.slug),
    lazy: async () => {
      const [{ GuideSheet }, Content] = await Promise.all([
        import("../features/guide/components/guide-sheet.tsx"),
        loadPage[page.slug](),
      ]);
      return {
        element: (
          <GuideSheet page={page}>
            <Content />
          </GuideSheet>
        ),
      };
    },
  })),
];

/** Every page of the console in the one frame. Each is loaded when it is first opened. */
export const routes: RouteObject[] = [
  {
    path: "/",
    element: <Layout />,
    hydrateFallbackElement: <Skeleton what="the page" />,
    children: [
      {
        errorElement: <ErrorPage />,
        children: [
          { element: <RequireSession />, children: memberPages },
          { element: <SessionIfAny />, children: openPages },
          {
            path: paths.signIn,
            lazy: async () => ({ Component: (await import("./routes/sign-in-page.tsx")).SignInPage }),
          },
          {
            path: paths.invitation,
            lazy: async () => ({ Component: (await import("./routes/invitation-page.tsx")).InvitationPage }),
          },
          { path: "*", element: <NotFoundPage /> },
        ],
      },
    ],
  },
];

export function createRouter() {
  return createBrowserRouter(routes);
}
