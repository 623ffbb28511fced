/** One dispatched event, as a page would be given it. */
export interface SeenEvent {
  readonly type: string;
  readonly lastEventId: string;
  readonly json: Readonly<Record<string, unknown>>;
}

/**
 * Reads an event stream by the rules of the WHATWG HTML standard, section 9.2.6 "Interpreting an
 * event stream" (https://html.spec.whatwg.org/multipage/server-sent-events.html).
 */
export class EventSourceReader {
  readonly comments: string[] = [];
  retryMs: number | null = null;
  lastEventId = '';
  private idBuffer = '';
  private readonly lines: AsyncIterator<string>;

  private constructor(lines: AsyncIterator<string>) {
    this.lines = lines;
  }

  static of(body: ReadableStream<Uint8Array>): EventSourceReader {
    return new EventSourceReader(linesOf(body));
  }

  /** The next event, or null at the end of the stream. */
  async next(): Promise<SeenEvent | null> {
    let type = '';
    let data: string | null = null;
    for (;;) {
      const { value: line, done } = await this.lines.next();
      if (done === true) return null;
      if (line === '') {
        this.lastEventId = this.idBuffer;
        if (data !== null) {
          return { type: type || 'message', lastEventId: this.lastEventId, json: JSON.parse(data) };
        }
        type = '';
        continue;
      }
      const [, field, value = ''] = /^([^:]*)(?:: ?(.*))?$/.exec(line) ?? [];
      if (field === '') this.comments.push(value);
      else if (field === 'event') type = value;
      else if (field === 'data') data = data === null ? value : `${data}\n${value}`;
      else if (field === 'id') this.idBuffer = value;
      else if (field === 'retry') this.retryMs = Number(value);
    }
  }

  /** Reads on until a comment has come. */
  async comment(): Promise<string | undefined> {
    while (this.comments.length === 0) {
      const { value: line, done } = await this.lines.next();
      if (done === true) return undefined;
      if (line.startsWith(':')) this.comments.push(line.slice(1).trim());
    }
    return this.comments.shift();
  }
}

async function* linesOf(body: ReadableStream<Uint8Array>): AsyncGenerator<string> {
  const decoder = new TextDecoder();
  let rest = '';
  for await (const bytes of body) {
    rest += decoder.decode(bytes, { stream: true });
    const lines = rest.split(/\r\n|\n|\r/);
    rest = lines.pop() ?? '';
    yield* lines;
  }
}
