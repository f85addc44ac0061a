import type { Author } from "../../shared/schemas/machines.ts";
import type { Caller } from "./caller.ts";
import type { CallerNames } from "./caller-names.ts";
import type { Claim } from "./idempotency.ts";

/** On whose behalf a service changes something, and under which call. */
export interface By {
  readonly caller: Caller;
  readonly claim: Claim | null;
  readonly requestId: string;
}

/** The columns that say who did it. */
export function authorColumns(caller: Caller): { memberId: string | null; keyId: string | null } {
  return caller.by === "member"
    ? { memberId: caller.member.id, keyId: null }
    : { memberId: null, keyId: caller.key.id };
}

export function presentAuthor(
  { memberId, keyId }: { readonly memberId: string | null; readonly keyId: string | null },
  names: CallerNames,
): Author {
  return { member: names.member(memberId), key: names.key(keyId) };
}
