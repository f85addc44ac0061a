import type { CalculationSummary } from "../../../shared/schemas/calculations.ts";

export type CalculationKind = CalculationSummary["kind"];

/** Addresses of the console's own pages. */
export const paths = {
  signIn: "/sign-in",
  invitation: "/invitation",
  calculations: "/calculations",
  calculation: (id: string): string => `/calculations/${encodeURIComponent(id)}`,
  machines: "/machines",
  newMachine: "/machines/new",
  machine: (id: string): string => `/machines/${encodeURIComponent(id)}`,
  editMachine: (id: string): string => `/machines/${encodeURIComponent(id)}/edit`,
  machineHistory: (id: string): string => `/machines/${encodeURIComponent(id)}/history`,
  jobs: "/jobs",
  newJob: "/jobs/new",
  job: (id: string): string => `/jobs/${encodeURIComponent(id)}`,
  tryCall: "/try",
  keys: "/keys",
  webhooks: "/webhooks",
  webhook: (id: string): string => `/webhooks/${encodeURIComponent(id)}`,
  outbox: "/outbox",
  selfTest: "/self-test",
  guide: "/guide",
  guidePage: (slug: string): string => `/guide/${slug}`,
} as const;

/** Pages that the server serves itself. */
export const serverPaths = { docs: "/docs", document: "/openapi.json" } as const;

/** Addresses of the API. */
export const apiPaths = {
  sessions: "/v1/sessions",
  refresh: "/v1/sessions/refresh",
  currentSession: "/v1/sessions/current",
  acceptInvitation: "/v1/invitations/accept",
  keys: "/v1/keys",
  revokeKey: (id: string): string => `/v1/keys/${encodeURIComponent(id)}/revoke`,
  webhooks: "/v1/webhooks",
  webhook: (id: string): string => `/v1/webhooks/${encodeURIComponent(id)}`,
  webhookSecret: (id: string): string => `/v1/webhooks/${encodeURIComponent(id)}/secret`,
  testWebhook: (id: string): string => `/v1/webhooks/${encodeURIComponent(id)}/test`,
  deliveries: (id: string): string => `/v1/webhooks/${encodeURIComponent(id)}/deliveries`,
  redelivery: (id: string, delivery: string): string =>
    `/v1/webhooks/${encodeURIComponent(id)}/deliveries/${encodeURIComponent(delivery)}/redelivery`,
  outbox: "/v1/outbox",
  outboxMail: (id: string): string => `/v1/outbox/${encodeURIComponent(id)}`,
  calculations: "/v1/calculations",
  calculation: (id: string): string => `/v1/calculations/${encodeURIComponent(id)}`,
  replay: (id: string): string => `/v1/calculations/${encodeURIComponent(id)}/replay`,
  machines: "/v1/machines",
  machine: (id: string): string => `/v1/machines/${encodeURIComponent(id)}`,
  machineImports: "/v1/machine-imports",
  machineTemplate: "/v1/machine-template",
  jobs: "/v1/jobs",
  job: (id: string): string => `/v1/jobs/${encodeURIComponent(id)}`,
  jobEvents: (id: string): string => `/v1/jobs/${encodeURIComponent(id)}/events`,
  indications: (id: string): string => `/v1/jobs/${encodeURIComponent(id)}/indications`,
  meta: "/v1/meta",
  problems: "/v1/problems",
  problem: (code: string): string => `/v1/problems/${encodeURIComponent(code)}`,
  selfTest: "/v1/engine/self-test",
} as const;

/** What can be computed: its name, its place in the address, and where it is posted. */
export const computations: Record<CalculationKind, { name: string; resource: string; path: string }> = {
  "bore-fit": { name: "Bore fit", resource: "bore-fits", path: "/v1/bore-fits" },
  "axis-deviation": { name: "Axis and deviations", resource: "axis-deviations", path: "/v1/axis-deviations" },
  "shim-move": { name: "Shim moves", resource: "shim-moves", path: "/v1/shim-moves" },
  "fewest-moves": { name: "Fewest moves", resource: "fewest-moves", path: "/v1/fewest-moves" },
  alignment: { name: "Alignment", resource: "alignments", path: "/v1/alignments" },
  "cold-target": { name: "Cold targets", resource: "cold-targets", path: "/v1/cold-targets" },
  confirmation: { name: "Confirmation", resource: "confirmations", path: "/v1/confirmations" },
  "repeatability-study": {
    name: "Repeatability study",
    resource: "repeatability-studies",
    path: "/v1/repeatability-studies",
  },
  "measurement-plan": {
    name: "Measurement plan",
    resource: "measurement-plans",
    path: "/v1/measurement-plans",
  },
  "sight-line-setup": {
    name: "Line-of-sight set-up",
    resource: "sight-line-setups",
    path: "/v1/sight-line-setups",
  },
};
