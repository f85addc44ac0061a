import { once } from "node:events";
import { createServer } from "node:http";
import type { AddressInfo } from "node:net";
import { openTestApp, type TestApp } from "./app.ts";

export interface ListeningApp extends TestApp {
  /** Where it answers, without a slash at the end. */
  readonly url: string;
}

/** The real application, listening: for programs that call it from outside. */
export async function openListeningApp(...settings: Parameters<typeof openTestApp>): Promise<ListeningApp> {
  const app = await openTestApp(...settings);
  const server = createServer(app.app).listen(0, "127.0.0.1");
  await once(server, "listening");
  const { port } = server.address() as AddressInfo;
  return {
    ...app,
    url: `http://127.0.0.1:${port}`,
    close: async () => {
      server.closeAllConnections();
      server.close();
      await app.close();
    },
  };
}
