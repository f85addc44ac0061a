import type {
  Delivery,
  Webhook,
  WebhookEventType,
  WebhookWithSecret,
} from "../../shared/schemas/webhooks.ts";
import { DeliveryWorker } from "../../server/webhooks/delivery-worker.ts";
import type { TestApp } from "./app.ts";
import { makeOrganisation, smallBoreFit, type TestOrganisation } from "./factories.ts";

/** What tests need so that something on this machine may be told. */
export const localWebhooks = { WEBHOOK_ALLOWED_NETWORKS: "127.0.0.0/8" } as const;

/** Calls the webhook operations of one organisation. */
export class WebhookDriver {
  readonly worker: DeliveryWorker;

  private constructor(
    readonly app: TestApp,
    readonly works: TestOrganisation,
    readonly token: string,
  ) {
    this.worker = new DeliveryWorker(app.deps);
  }

  /** As plant software, by a key: a sign-in would end when a test moves the clock. */
  static async open(app: TestApp): Promise<WebhookDriver> {
    const works = await makeOrganisation(app.deps);
    const { secret } = await works.key("webhooks:read", "webhooks:write", "calculations:write");
    return new WebhookDriver(app, works, secret);
  }

  post(path: string, body?: object) {
    return this.app.call().post(path).set("Authorization", `Bearer ${this.token}`).send(body);
  }

  get(path: string) {
    return this.app.call().get(path).set("Authorization", `Bearer ${this.token}`);
  }

  patch(id: string, version: number, body: object) {
    return this.app
      .call()
      .patch(`/v1/webhooks/${id}`)
      .set("Authorization", `Bearer ${this.token}`)
      .set("If-Match", `"${version}"`)
      .send(body);
  }

  remove(id: string) {
    return this.app.call().delete(`/v1/webhooks/${id}`).set("Authorization", `Bearer ${this.token}`);
  }

  async add(
    url: string,
    events: readonly WebhookEventType[] = ["calculation.stored"],
  ): Promise<WebhookWithSecret> {
    const { status, body } = await this.post("/v1/webhooks", { name: "Planner", url, events });
    if (status !== 201) throw new Error(JSON.stringify(body));
    return body as WebhookWithSecret;
  }

  async read(id: string): Promise<Webhook> {
    return (await this.get(`/v1/webhooks/${id}`)).body as Webhook;
  }

  async deliveries(id: string, query = ""): Promise<Delivery[]> {
    return ((await this.get(`/v1/webhooks/${id}/deliveries${query}`)).body as { data: Delivery[] }).data;
  }

  /** Stores a calculation, and answers its id. */
  async compute(): Promise<string> {
    const { status, body } = await this.post("/v1/bore-fits", smallBoreFit);
    if (status !== 201) throw new Error(JSON.stringify(body));
    return (body as { id: string }).id;
  }
}
