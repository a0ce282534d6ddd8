/** Walks over the lines of a text without making an array of them. Lines end with LF, CRLF or a lone CR. */
export class LineCursor {
  /** Number of the line that `next` gave last, from 1. */
  line = 0;
  /** The line that `next` gave last is text[start, end). */
  start = 0;
  end = 0;
  #next = 0;
  #ending: string;

  constructor(readonly text: string) {
    this.#ending = text.includes('\n') ? '\n' : '\r';
    if (text.charCodeAt(0) === 0xfeff) this.#next = 1;
  }

  /** Steps to the next line; false at the end of the text. */
  next(): boolean {
    if (this.#next >= this.text.length) return false;
    const found = this.text.indexOf(this.#ending, this.#next);
    const end = found < 0 ? this.text.length : found;
    this.line += 1;
    this.start = this.#next;
    this.end = end > this.start && this.text.charCodeAt(end - 1) === 13 ? end - 1 : end;
    this.#next = end + 1;
    return true;
  }

  /** Columns of the line, from 0; what lies behind its end is empty. */
  columns(from: number, to: number): string {
    return this.text.slice(Math.min(this.start + from, this.end), Math.min(this.start + to, this.end));
  }

  /** The label that tells what the line is, columns 61 to 80. */
  label(): string {
    return this.columns(60, 80).trim();
  }
}
