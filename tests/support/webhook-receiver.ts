import { once } from "node:events";
import { createServer, type IncomingHttpHeaders, type ServerResponse } from "node:http";
import type { AddressInfo } from "node:net";
import { Webhook } from "standardwebhooks";

export interface Received {
  readonly id: string;
  readonly headers: IncomingHttpHeaders;
  readonly text: string;
  readonly payload: { type: string; timestamp: string; data: Record<string, unknown> };
  /** Whether the public library takes one of its signatures for one by this secret, at the time it states. */
  signedWith(secret: string): boolean;
}

/** A program that listens for webhooks, and answers as it is told. */
export class WebhookReceiver {
  readonly received: Received[] = [];
  answer: (response: ServerResponse) => void = (response) => response.writeHead(204).end();
  private readonly server = createServer((request, response) => {
    const chunks: Buffer[] = [];
    request.on("data", (chunk: Buffer) => chunks.push(chunk));
    request.on("end", () => {
      this.received.push(receivedOf(request.headers, Buffer.concat(chunks).toString()));
      this.answer(response);
    });
  });

  async open(): Promise<this> {
    this.server.listen(0, "127.0.0.1");
    await once(this.server, "listening");
    return this;
  }

  get url(): string {
    return `http://127.0.0.1:${(this.server.address() as AddressInfo).port}/hook`;
  }

  get port(): number {
    return (this.server.address() as AddressInfo).port;
  }

  /** Forgets what came, and answers 204 again. */
  reset(): void {
    this.received.length = 0;
    this.answer = (response) => response.writeHead(204).end();
  }

  close(): void {
    this.server.closeAllConnections();
    this.server.close();
  }
}

function receivedOf(headers: IncomingHttpHeaders, text: string): Received {
  const id = String(headers["webhook-id"]);
  return {
    id,
    headers,
    text,
    payload: JSON.parse(text) as Received["payload"],
    signedWith: (secret) => {
      const at = new Date(Number(headers["webhook-timestamp"]) * 1000);
      const expected = new Webhook(secret).sign(id, at, text);
      return String(headers["webhook-signature"]).split(" ").includes(expected);
    },
  };
}
