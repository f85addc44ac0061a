import type { z } from "zod";
import { scopesOfRole, type Role } from "../../../shared/access.ts";
import { cautions } from "../../../shared/cautions.ts";
import type { calculationSummary } from "../../../shared/schemas/calculations.ts";
import type { CreatedKey, Key } from "../../../shared/schemas/keys.ts";
import type { Session } from "../../../shared/schemas/sessions.ts";

/** An id that is well-formed and tells itself from the others by its number. */
export const sampleId = (number: number): string =>
  `0193a5e0-7c00-7000-8000-${String(number).padStart(12, "0")}`;

export const organisation = { id: sampleId(1), name: "Fellgate Works" };

export const sampleMeta = {
  engineVersion: "1.0.0",
  engineChangelog:
    "# Changes of the engine\n\nWhat changed stands here.\n\n## 1.0.0\n\nFirst version.\n\n- **Bore fits** by `least_squares`,\n  from points.\n",
  cautions: [...cautions],
};

export function sampleSession(role: Role, overrides: Partial<Session> = {}): Session {
  return {
    accessToken: `token-of-${role}`,
    expiresAt: new Date(Date.now() + 600_000).toISOString(),
    member: { id: sampleId(10), email: `${role}@example.com`, name: "Ines Alder", role, organisation },
    ...overrides,
  };
}

export function sampleKey(overrides: Partial<Key> = {}): Key {
  return {
    id: sampleId(100),
    name: "Outage planning",
    prefix: "bw_live_outage",
    scopes: ["calculations:write", "calculations:read"],
    status: "active",
    createdAt: "2026-12-01T06:00:00.000Z",
    createdBy: { id: sampleId(10), name: "Ines Alder" },
    expiresAt: null,
    lastUsedAt: null,
    revokedAt: null,
    version: 1,
    ...overrides,
  };
}

export function sampleCreatedKey(overrides: Partial<CreatedKey> = {}): CreatedKey {
  return { ...sampleKey(), secret: "bw_live_outage_THE-ONE-SECRET", ...overrides };
}

export function sampleSummary(
  overrides: Partial<z.infer<typeof calculationSummary>> = {},
): z.infer<typeof calculationSummary> {
  return {
    id: sampleId(200),
    kind: "bore-fit",
    status: "succeeded",
    createdAt: "2026-12-01T06:00:00.000Z",
    durationMs: 1.25,
    engineVersion: "1.0.0",
    inputHash: `sha256:${"1".repeat(64)}`,
    resultHash: `sha256:${"2".repeat(64)}`,
    member: { id: sampleId(10), name: "Ines Alder" },
    key: null,
    requestId: "req-200",
    note: null,
    jobId: null,
    ...overrides,
  };
}

export const everyRole: readonly Role[] = ["admin", "engineer", "developer", "viewer"];
export const rolesThatIssueKeys = everyRole.filter((role) => scopesOfRole(role).includes("keys:write"));
