/**
 * Who may do what: one row for each operation. A signed-in member needs a role of the row, an API key its scope.
 * Enforced by server/middleware/authenticate.ts alone; tests walk every row. What is not listed cannot be routed.
 */
export const roles = ["admin", "engineer", "developer", "viewer"] as const;
export type Role = (typeof roles)[number];

export const scopes = [
  "calculations:write",
  "calculations:read",
  "usage:read",
  "keys:read",
  "keys:write",
  "members:read",
  "members:write",
  "machines:read",
  "machines:write",
  "jobs:read",
  "jobs:write",
  "webhooks:read",
  "webhooks:write",
  "outbox:read",
] as const;
export type Scope = (typeof scopes)[number];

export type Access =
  /** Anyone, signed in or not. */
  | { readonly by: "anyone" }
  /** Any credential of an organisation. */
  | { readonly by: "caller" }
  /** A signed-in member only: it acts on the member's own session. */
  | { readonly by: "member" }
  | { readonly by: "scope"; readonly scope: Scope; readonly roles: readonly Role[] };

const anyone: Access = { by: "anyone" };
const caller: Access = { by: "caller" };
const member: Access = { by: "member" };
const grant = (scope: Scope, ...allowed: Role[]): Access => ({ by: "scope", scope, roles: allowed });

const compute = grant("calculations:write", "admin", "engineer", "developer");
const readRecords = grant("calculations:read", "admin", "engineer", "developer", "viewer");
const readKeys = grant("keys:read", "admin", "engineer", "developer");
const writeKeys = grant("keys:write", "admin", "developer");
const readMembers = grant("members:read", "admin", "engineer");
const writeMembers = grant("members:write", "admin");
const readMachines = grant("machines:read", "admin", "engineer", "developer", "viewer");
const writeMachines = grant("machines:write", "admin", "engineer");
const readJobs = grant("jobs:read", "admin", "engineer", "developer", "viewer");
const writeJobs = grant("jobs:write", "admin", "engineer");
const readWebhooks = grant("webhooks:read", "admin", "engineer", "developer");
const writeWebhooks = grant("webhooks:write", "admin", "developer");
const readOutbox = grant("outbox:read", "admin");

export const operationAccess = {
  createBoreFit: compute,
  createAxisDeviation: compute,
  createShimMove: compute,
  createFewestMoves: compute,
  createAlignment: compute,
  createColdTarget: compute,
  createConfirmation: compute,
  createRepeatabilityStudy: compute,
  createMeasurementPlan: compute,
  createSightLineSetup: compute,
  replayCalculation: compute,
  listCalculations: readRecords,
  readCalculation: readRecords,
  listKeys: readKeys,
  readKey: readKeys,
  createKey: writeKeys,
  revokeKey: writeKeys,
  listMembers: readMembers,
  readMember: readMembers,
  createMember: writeMembers,
  updateMember: writeMembers,
  renewInvitation: writeMembers,
  acceptInvitation: anyone,
  listMachines: readMachines,
  createMachine: writeMachines,
  readMachine: readMachines,
  updateMachine: writeMachines,
  listMachineRevisions: readMachines,
  reviseMachine: writeMachines,
  readMachineRevision: readMachines,
  compareMachineRevisions: readMachines,
  copyMachine: writeMachines,
  readMachineTemplate: readMachines,
  readMachineWorkbook: readMachines,
  importMachine: writeMachines,
  readMachineHistory: readMachines,
  listJobs: readJobs,
  createJob: writeJobs,
  readJob: readJobs,
  updateJob: writeJobs,
  readJobRevision: readJobs,
  reviseJob: writeJobs,
  answerCheck: writeJobs,
  addSurvey: writeJobs,
  addReadings: writeJobs,
  computeSurvey: writeJobs,
  planJobMoves: writeJobs,
  logMove: writeJobs,
  confirmJob: writeJobs,
  grantConcession: writeJobs,
  acceptAxis: writeJobs,
  addComment: writeJobs,
  withdrawEntry: writeJobs,
  readJobLog: readJobs,
  addIndication: writeJobs,
  streamIndications: writeJobs,
  watchJob: readJobs,
  previewReadingFile: writeJobs,
  addReadingFile: writeJobs,
  addAttachment: writeJobs,
  readAttachment: readJobs,
  readReport: readJobs,
  readReportFile: readJobs,
  mailReport: writeJobs,
  listJobFigures: readJobs,
  readJobFigure: readJobs,
  signJob: grant("jobs:write", "admin", "engineer"),
  listWebhooks: readWebhooks,
  createWebhook: writeWebhooks,
  readWebhook: readWebhooks,
  updateWebhook: writeWebhooks,
  rotateWebhookSecret: writeWebhooks,
  removeWebhook: writeWebhooks,
  testWebhook: writeWebhooks,
  listWebhookDeliveries: readWebhooks,
  readWebhookDelivery: readWebhooks,
  redeliverWebhook: writeWebhooks,
  listOutbox: readOutbox,
  readOutboxMail: readOutbox,
  readUsage: grant("usage:read", "admin", "engineer", "developer"),
  createSession: anyone,
  refreshSession: anyone,
  endSession: member,
  readCaller: caller,
  readMeta: anyone,
  readSelfTest: caller,
  listProblems: anyone,
  readProblem: anyone,
  readLiveness: anyone,
  readReadiness: anyone,
  readMetrics: anyone,
  readDocument: anyone,
} as const satisfies Record<string, Access>;

export type OperationId = keyof typeof operationAccess;

/** The scopes that a role's own operations need: what its members can do, and can grant to a key. */
export function scopesOfRole(role: Role): Scope[] {
  const rows: Access[] = Object.values(operationAccess);
  return scopes.filter((scope) =>
    rows.some((row) => row.by === "scope" && row.scope === scope && row.roles.includes(role)),
  );
}
