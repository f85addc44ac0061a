import { indicationAnswer, type IndicationAnswer } from "../../../../../shared/schemas/indications.ts";
import { apiPaths } from "../../../config/paths.ts";
import { openStreamAsMember } from "../../../lib/call-api.ts";
import { followEvents, type StreamEvent, type StreamState } from "../../../lib/follow-events.ts";
import { NoAnswerError } from "../../../lib/service-error.ts";

export interface Watched {
  readonly state: StreamState;
  /** Why it is not live, where that is known. */
  readonly error: unknown;
  /** What was answered to indications, the newest first. */
  readonly answers: readonly IndicationAnswer[];
}

/** Events that come together are shown together: a stream of readings must not redraw the page for each. */
const togetherMs = 250;
/** A log that grows fast is read anew no oftener than this. */
const logEveryMs = 2_000;
const answersKept = 200;

/** The events of one job, as long as somebody asks for them; and what was answered to this page's own indications. */
export class JobWatch {
  private shown: Watched = { state: "stopped", error: null, answers: [] };
  private readonly listeners = new Set<() => void>();
  private waiting: IndicationAnswer[] = [];
  private following: AbortController | null = null;
  private showTimer: ReturnType<typeof setTimeout> | undefined;
  private logTimer: ReturnType<typeof setTimeout> | undefined;

  constructor(
    private readonly job: string,
    /** Told that something was added to the job's log. */
    private readonly onLogChanged: () => void,
  ) {}

  readonly subscribe = (listener: () => void): (() => void) => {
    this.listeners.add(listener);
    return () => this.listeners.delete(listener);
  };

  readonly read = (): Watched => this.shown;

  /** Begins with what comes now, or with the job's first event. */
  readonly start = (from: "now" | "first" = "now"): void => {
    this.letGo();
    const following = new AbortController();
    this.following = following;
    this.show({ state: "reconnecting", error: null });
    void followEvents({
      lastId: from === "first" ? "0" : null,
      signal: following.signal,
      open: (lastId, signal) =>
        openStreamAsMember({
          method: "GET",
          path: apiPaths.jobEvents(this.job),
          signal,
          ...(lastId === null ? {} : { lastEventId: lastId }),
        }),
      onEvent: (event) => this.hear(event),
      onState: (state, error) => this.show({ state, error }),
    });
  };

  readonly stop = (): void => {
    this.letGo();
    this.show({ state: "stopped", error: null });
  };

  /** Takes an answer in; the same one again, from the call and from the stream, is one. */
  readonly add = (answer: IndicationAnswer): void => {
    this.waiting.push(answer);
    this.showTimer ??= setTimeout(this.showWaiting, togetherMs);
  };

  private hear({ type, data }: StreamEvent): void {
    if (type === "entry") this.logTimer ??= setTimeout(this.tellOfLog, logEveryMs);
    if (type !== "indication") return;
    const answer = readIndication(data);
    if (answer) return this.add(answer);
    this.letGo();
    const error = new NoAnswerError(
      "The service tells of readings in a form this console does not know. Reload the page to get the console of its version.",
    );
    this.show({ state: "stopped", error });
  }

  private readonly tellOfLog = (): void => {
    this.logTimer = undefined;
    this.onLogChanged();
  };

  private readonly showWaiting = (): void => {
    this.showTimer = undefined;
    const answers = newestFirst([...this.waiting, ...this.shown.answers]).slice(0, answersKept);
    this.waiting = [];
    this.show({ answers });
  };

  private letGo(): void {
    this.following?.abort();
    this.following = null;
    clearTimeout(this.logTimer);
    this.logTimer = undefined;
  }

  private show(change: Partial<Watched>): void {
    this.shown = { ...this.shown, ...change };
    for (const listener of this.listeners) listener();
  }
}

/** Each once, in the order in which the service kept them: by its own time, not by that of the reading. */
function newestFirst(answers: readonly IndicationAnswer[]): IndicationAnswer[] {
  const byId = new Map(answers.map((answer) => [answer.id, answer]));
  return [...byId.values()].sort((one, other) =>
    `${one.createdAt}${one.id}` < `${other.createdAt}${other.id}` ? 1 : -1,
  );
}

function readIndication(data: string): IndicationAnswer | null {
  try {
    return indicationAnswer.parse(JSON.parse(data));
  } catch {
    return null;
  }
}
