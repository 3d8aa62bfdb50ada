import type { Response } from 'express';

/** Text made fit to stand in HTML, in attributes too. */
export function escapeHtml(text: string): string {
  const entities: Record<string, string> = { '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;', "'": '&#39;' };
  return text.replace(/[&<>"']/g, (letter) => entities[letter] ?? letter);
}

/** A whole page around a body that is HTML already; the style sheet is served by the stand-in itself. */
export function htmlPage(title: string, body: string): string {
  return [
    '<!doctype html><html lang="en"><head><meta charset="utf-8">',
    '<meta name="viewport" content="width=device-width, initial-scale=1">',
    `<title>${escapeHtml(title)}</title><link rel="stylesheet" href="/style.css"></head>`,
    `<body>${body}</body></html>`,
  ].join('\n');
}

/**
 * Send a page under a policy that lets nothing run and nothing load but its own style sheet.
 * @param formTargets origins besides its own that a form may end at: browsers hold redirects after a form to it too
 */
export function sendHtml(response: Response, html: string, status = 200, formTargets: readonly string[] = []): void {
  const forms = ["'self'", ...formTargets].join(' ');
  response
    .status(status)
    .set({
      'content-security-policy': `default-src 'none'; style-src 'self'; form-action ${forms}; base-uri 'none'; frame-ancestors 'none'`,
      'x-content-type-options': 'nosniff',
      'referrer-policy': 'no-referrer',
      'cache-control': 'no-store',
    })
    .type('html')
    .send(html);
}
