import type { Role, Scope } from "../../shared/access.ts";

interface Organisation {
  readonly id: string;
  readonly name: string;
}

/** Who a request speaks for, as it stands now: role, scopes and revocation are read per request, not from the token. */
export type Caller =
  | {
      readonly by: "member";
      readonly organisation: Organisation;
      readonly member: {
        readonly id: string;
        readonly name: string;
        readonly email: string;
        readonly role: Role;
      };
      readonly sessionId: string;
    }
  | {
      readonly by: "key";
      readonly organisation: Organisation;
      readonly key: { readonly id: string; readonly name: string; readonly prefix: string };
      readonly scopes: readonly Scope[];
    };

/** The id that limits, idempotency and audit count a caller by. */
export function credentialOf(caller: Caller): string {
  return caller.by === "member" ? caller.member.id : caller.key.id;
}
