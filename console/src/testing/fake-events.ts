import type { Answer } from "./fake-service.ts";

/** A stream of events that the test speaks into. Each time it is asked for it begins anew. */
export class FakeEvents {
  /** How often it was asked for, and how often its reader let it go. */
  opened = 0;
  released = 0;
  private controller: ReadableStreamDefaultController<Uint8Array> | null = null;
  private number = 40;

  readonly answerer = (): Answer => {
    this.opened += 1;
    const body = new ReadableStream<Uint8Array>({
      start: (controller) => {
        this.controller = controller;
      },
      cancel: () => {
        this.released += 1;
        this.controller = null;
      },
    });
    this.write(`id: ${this.number}\nevent: watching\ndata: {"last":${this.number}}\n\n`);
    return { status: 200, body };
  };

  say(type: string, data: unknown): void {
    this.number += 1;
    this.write(`id: ${this.number}\nevent: ${type}\ndata: ${JSON.stringify(data)}\n\n`);
  }

  /** The line breaks. */
  cut(): void {
    this.controller?.error(new TypeError("network error"));
    this.controller = null;
  }

  private write(text: string): void {
    this.controller?.enqueue(new TextEncoder().encode(text));
  }
}
