import { type Html, html, trusted } from './html.js';
import { PAGE_STYLE } from './style.js';

/** A whole page without anything to load. */
export function htmlPage({
  title,
  kind,
  body,
}: {
  readonly title: string;
  /** Class of the page, for its style. */
  readonly kind: 'report' | 'annex' | 'card';
  readonly body: Html;
}): string {
  return html`<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
<title>${title}</title>
<style>${trusted(PAGE_STYLE)}</style>
</head>
<body class="${kind}">
<main>
${body}
</main>
</body>
</html>
`.text;
}
