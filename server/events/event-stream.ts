import { Readable } from 'node:stream';

/** A reader that takes so little that more than this waits is cut off; it comes back and replays. */
const mostWaitingBytes = 1024 * 1024;

/** The answer of one listener in the form of server-sent events (WHATWG HTML, section 9.2). */
export class EventStream extends Readable {
  private isEnding = false;

  constructor() {
    super({ highWaterMark: mostWaitingBytes });
  }

  override _read(): void {
    // Nothing can be asked for: events come when they happen.
  }

  /** Sends one event; `json` has no line break. */
  event(id: number, kind: string, json: string): void {
    this.write(`id: ${id}\nevent: ${kind}\ndata: ${json}\n\n`);
  }

  /** Tells from where to go on after a break, without an event. */
  place(id: number): void {
    this.write(`id: ${id}\n\n`);
  }

  /** How long a listener waits before it comes back. */
  retryAfter(ms: number): void {
    this.write(`retry: ${ms}\n\n`);
  }

  /** Keeps connections open that proxies would end for silence. */
  comment(text: string): void {
    this.write(`: ${text}\n\n`);
  }

  /** Ends the answer after what was sent. */
  end(): void {
    if (this.isEnding || this.destroyed) return;
    this.isEnding = true;
    this.push(null);
  }

  private write(text: string): void {
    if (this.destroyed || this.isEnding) return;
    if (this.readableLength > mostWaitingBytes) {
      this.destroy();
      return;
    }
    this.push(text);
  }
}
