import { QueryClientProvider, type QueryClient } from "@tanstack/react-query";
import type { ReactNode } from "react";
import { useSessionEvents } from "../features/session/components/use-session-events.ts";

interface AppProviderProps {
  queryClient: QueryClient;
  children: ReactNode;
}

/** What every page stands on: the answers read so far, and the session they were read in. */
export function AppProvider({ queryClient, children }: AppProviderProps) {
  useSessionEvents(queryClient);
  return <QueryClientProvider client={queryClient}>{children}</QueryClientProvider>;
}
