import { createBrowserRouter, Navigate, type RouteObject } from "react-router-dom";
import { Skeleton } from "../components/ui/skeleton.tsx";
import { paths } from "../config/paths.ts";
import { RequireSession } from "../features/session/components/require-session.tsx";
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
    path: paths.tryCall,
    lazy: async () => ({ Component: (await import("./routes/try-page.tsx")).TryPage }),
  },
  {
    path: paths.keys,
    lazy: async () => ({ Component: (await import("./routes/keys-page.tsx")).KeysPage }),
  },
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
