import "./lib/without-eval.ts";
import { StrictMode } from "react";
import { createRoot } from "react-dom/client";
import { RouterProvider } from "react-router-dom";
import { AppProvider } from "./app/provider.tsx";
import { createRouter } from "./app/router.tsx";
import { createQueryClient } from "./lib/query-client.ts";
import "./styles/index.css";

const root = document.getElementById("root");
if (!root) throw new Error("index.html has no element #root.");
createRoot(root).render(
  <StrictMode>
    <AppProvider queryClient={createQueryClient()}>
      <RouterProvider router={createRouter()} />
    </AppProvider>
  </StrictMode>,
);
