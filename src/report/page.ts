/** One self-contained HTML document: style inside, no script, and a policy that forbids every outside request. */
import { hatchDefinitions } from './ledger-figure.ts';
import { markup, Markup } from './markup.ts';
import { reportStyle } from './report-style.ts';

const policy = "default-src 'none'; img-src data:; style-src 'unsafe-inline'";

/** The document's text; `title` is plain text, `content` goes into the body. */
export function htmlPage(title: string, content: Markup): string {
  return markup`<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta http-equiv="Content-Security-Policy" content="${policy}">
<meta name="viewport" content="width=device-width, initial-scale=1">
<meta name="referrer" content="no-referrer">
<title>${title}</title>
<style>${new Markup(reportStyle)}</style>
</head>
<body>
${hatchDefinitions()}
${content}
</body>
</html>
`.text;
}
