import type { Scope } from "../../../../../shared/access.ts";

/** What each scope lets a key do, as its maker reads it. */
export const scopeWords: Record<Scope, string> = {
  "calculations:write": "Compute, and replay records",
  "calculations:read": "Read calculation records",
  "usage:read": "Read usage",
  "keys:read": "Read the list of keys",
  "keys:write": "Issue and revoke keys",
  "members:read": "Read members",
  "members:write": "Invite and change members",
  "machines:read": "Read machines",
  "machines:write": "Add and change machines",
  "jobs:read": "Read jobs and their reports",
  "jobs:write": "Run jobs: readings, moves, comments",
  "webhooks:read": "Read webhooks and what was delivered",
  "webhooks:write": "Add, change and test webhooks",
  "outbox:read": "Read mail that the service kept",
};
