import type { Server } from "node:http";
import { setTimeout as sleep } from "node:timers/promises";

/** How long calls in flight may take to end before they are cut. */
const IN_FLIGHT_MS = 25_000;

/** Waits `drainMs` for load balancers to turn away, takes no new connection, ends idle ones, and lets calls in flight end. */
export async function stopServer(server: Server, drainMs: number): Promise<void> {
  if (drainMs > 0) await sleep(drainMs);
  const closed = new Promise<void>((resolve) => server.close(() => resolve()));
  server.closeIdleConnections();
  // A connection kept alive goes idle when its last answer is out.
  const sweep = setInterval(() => server.closeIdleConnections(), 100);
  const cut = setTimeout(() => server.closeAllConnections(), IN_FLIGHT_MS);
  await closed;
  clearInterval(sweep);
  clearTimeout(cut);
}
