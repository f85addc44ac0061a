/** Unsent work, kept for this tab until it is sent, put back or the member signs out. */
const prefix = "borewright.draft.";
const ownerKey = "borewright.drafts-of";

export function readDraft(name: string): string | null {
  try {
    return sessionStorage.getItem(prefix + name);
  } catch {
    return null;
  }
}

/** `null` forgets it. */
export function writeDraft(name: string, text: string | null): void {
  try {
    if (text === null) sessionStorage.removeItem(prefix + name);
    else sessionStorage.setItem(prefix + name, text);
  } catch {
    // Storage is barred or full: the text stays on the page, it only does not outlive it.
  }
}

export function forgetDrafts(): void {
  try {
    for (const key of Object.keys(sessionStorage)) if (key.startsWith(prefix)) sessionStorage.removeItem(key);
  } catch {
    // Storage is barred: nothing was kept.
  }
}

/** Drafts left in this tab by another member are forgotten; those of `memberId` stay. */
export function claimDrafts(memberId: string): void {
  try {
    if (sessionStorage.getItem(ownerKey) !== memberId) forgetDrafts();
    sessionStorage.setItem(ownerKey, memberId);
  } catch {
    // Storage is barred: nothing was kept.
  }
}
