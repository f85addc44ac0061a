/** What the tabs of one browser tell each other. Never a token. */
export type TabMessage = { readonly type: "opened"; readonly memberId: string } | { readonly type: "closed" };

const channel = typeof BroadcastChannel === "undefined" ? null : new BroadcastChannel("borewright.session");

export function tellOtherTabs(message: TabMessage): void {
  channel?.postMessage(message);
}

export function hearOtherTabs(listener: (message: TabMessage) => void): () => void {
  const onMessage = (event: MessageEvent<TabMessage>): void => listener(event.data);
  channel?.addEventListener("message", onMessage);
  return () => channel?.removeEventListener("message", onMessage);
}

/** Runs `work` while no other tab of this browser runs its own: the refresh token rotates, two at once would race. */
export function inOneTabAtATime<Result>(work: () => Promise<Result>): Promise<Result> {
  // Locks exist in secure contexts only; over plain http the server's grace for two tabs has to do.
  if (!("locks" in navigator)) return work();
  return navigator.locks.request("borewright.session", work);
}
