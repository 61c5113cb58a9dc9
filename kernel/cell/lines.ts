// Messages between the processes of a session: one JSON value a line.

/** One message as a line, ready to be written. */
export function encodeLine(message: unknown): string {
  return `${JSON.stringify(message)}\n`;
}

/** Cuts a byte stream into lines; a line may come in many pieces. */
export class LineReader {
  #pieces: Buffer[] = [];

  /** Feeds a chunk and returns the lines that it completes. */
  push(chunk: Buffer): string[] {
    const lines: string[] = [];
    let start = 0;
    for (let end = chunk.indexOf(10); end >= 0; end = chunk.indexOf(10, start)) {
      this.#pieces.push(chunk.subarray(start, end));
      lines.push(Buffer.concat(this.#pieces).toString("utf8"));
      this.#pieces = [];
      start = end + 1;
    }
    if (start < chunk.length) this.#pieces.push(chunk.subarray(start));
    return lines;
  }
}
