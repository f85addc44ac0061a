/** Whether the service has been told to stop: readiness says so at once, while calls in flight are still answered. */
export class Shutdown {
  private stopping = false;

  get begun(): boolean {
    return this.stopping;
  }

  begin(): void {
    this.stopping = true;
  }
}
