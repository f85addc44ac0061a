import type { Deps } from "../deps.ts";
import { sendQueuedMails } from "../mail/send-queued.ts";
import { DeliveryWorker } from "../webhooks/delivery-worker.ts";
import { tellOfExpiringKeys } from "./key-expiry.ts";
import { PeriodicTask } from "./periodic-task.ts";
import { purgeExpired } from "./purge-expired.ts";

const SECOND_MS = 1_000;
const MINUTE_MS = 60 * SECOND_MS;

/** Starts what the service does without being asked: webhooks, mail, notices of keys that end, tidying up. */
export async function startBackground(deps: Deps): Promise<{ stop(): Promise<void> }> {
  await deps.mailer.start();
  const deliveries = new DeliveryWorker(deps);
  deliveries.start();
  const tasks = [
    new PeriodicTask("mail", 5 * SECOND_MS, () => sendQueuedMails(deps), deps.log),
    new PeriodicTask("notices of keys that end", 5 * MINUTE_MS, () => tellOfExpiringKeys(deps), deps.log),
    new PeriodicTask("purge", 10 * MINUTE_MS, () => purgeExpired(deps), deps.log),
  ];
  return {
    stop: async () => {
      await Promise.all([deliveries.stop(), ...tasks.map((task) => task.stop())]);
    },
  };
}
