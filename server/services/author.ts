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

export const nameOfCaller = (caller: Caller): string =>
  caller.by === "member" ? caller.member.name : caller.key.name;

/** Who did it, by today's name, or by the one that was kept with what was done. */
export function presentAuthor(
  {
    memberId,
    keyId,
    authorName,
  }: {
    readonly memberId: string | null;
    readonly keyId: string | null;
    readonly authorName?: string;
  },
  names: CallerNames,
): Author {
  const named = <Known extends { readonly name: string }>(known: Known | null) =>
    known && authorName !== undefined ? { ...known, name: authorName } : known;
  return { member: named(names.member(memberId)), key: named(names.key(keyId)) };
}
