/** One number of a page: what stands there, and where it says it is from. */
export interface PageNumber {
  readonly attributes: ReadonlyMap<string, string>;
  readonly text: string;
}

/** Every number that a page marks as one. */
export function pageNumbers(page: string): PageNumber[] {
  return [...page.matchAll(/<data ([^>]*)>([^<]*)<\/data>/g)].map(([, attributes, text]) => ({
    attributes: new Map(
      [...attributes!.matchAll(/([\w-]+)="([^"]*)"/g)].map(([, name, value]) => [name!, value!]),
    ),
    text: text!,
  }));
}

/** The value at a JSON Pointer (RFC 6901). */
export function atPointer(value: unknown, pointer: string): unknown {
  return pointer
    .split('/')
    .slice(1)
    .reduce(
      (part, key) => (part as Record<string, unknown>)[key.replaceAll('~1', '/').replaceAll('~0', '~')],
      value,
    );
}

/** The words of a page outside of marked numbers, tags, pictures and head. */
export function otherWords(page: string): string {
  return /<main>([\s\S]*)<\/main>/
    .exec(page)![1]!
    .replace(/<data [^>]*>[^<]*<\/data>/g, ' ')
    .replace(/<[^>]*>/g, ' ')
    .replaceAll('&quot;', '"')
    .replaceAll('&#39;', "'")
    .replaceAll('&lt;', '<')
    .replaceAll('&gt;', '>')
    .replaceAll('&amp;', '&');
}

/** What a reader reads in a number: without thin spaces, with an ASCII minus; NaN for words. */
export function readNumber(text: string): number {
  const plain = text.replace(/[\u202f\u00a0 %]/g, '').replace('\u2212', '-');
  const clock = /^(\d+):(\d\d)$/.exec(plain);
  return clock === null ? Number(plain) : Number(clock[1]) + Number(clock[2]) / 60;
}
