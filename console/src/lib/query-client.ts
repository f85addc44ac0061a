import { QueryClient } from "@tanstack/react-query";
import { isWorthRetrying } from "./service-error.ts";

export function createQueryClient(retryDelayMs = 700): QueryClient {
  return new QueryClient({
    defaultOptions: {
      queries: {
        staleTime: 10_000,
        // The browser's own word on being offline is not asked: a failed call says so, and can be tried again.
        networkMode: "always",
        retry: (count, error) => count < 1 && isWorthRetrying(error),
        retryDelay: retryDelayMs,
      },
      mutations: { networkMode: "always", retry: false },
    },
  });
}
