import { createHash } from 'node:crypto';
import { type Element, inlineJson, markup, visible } from './element.ts';
import { pageStyle } from './page-style.ts';

/** by which a page is known as one that may be replaced */
export const GENERATOR = 'gapwake report';

/** One self-contained page. */
export interface Page {
  readonly title: string;
  readonly body: readonly Element[];
  /** read by the script as the text of `#data`; plain JSON */
  readonly data: unknown;
  /** the page's own script, bundled */
  readonly script: string;
}

/** The page as HTML text.
 *
 *  It asks nothing of any network: the policy in its head allows its own script and style, by their hashes, and pictures that lie inside of it, nothing
 *  else. A file's texts cannot become markup (`element.ts`); if one ever did, the policy would still keep it from running or loading anything. */
export function html({ title, body, data, script }: Page): string {
  const code = script.replaceAll('</script', '<\\/script').trim();
  const style = pageStyle.trim();
  const policy = [
    "default-src 'none'",
    `script-src '${hash(code)}'`,
    `style-src '${hash(style)}'`,
    'img-src data:',
    "base-uri 'none'",
    "form-action 'none'",
  ].join('; ');
  return [
    '<!DOCTYPE html>',
    '<html lang="en">',
    '<head>',
    '<meta charset="utf-8">',
    `<meta http-equiv="Content-Security-Policy" content="${policy}">`,
    '<meta name="viewport" content="width=device-width, initial-scale=1">',
    '<meta name="color-scheme" content="light dark">',
    '<meta name="referrer" content="no-referrer">',
    `<meta name="generator" content="${GENERATOR}">`,
    '<link rel="icon" href="data:,">',
    `<title>${markup(visible(title))}</title>`,
    `<style>${style}</style>`,
    '</head>',
    '<body>',
    ...body.map(markup),
    `<script type="application/json" id="data">${inlineJson(data)}</script>`,
    `<script type="module">${code}</script>`,
    '</body>',
    '</html>',
    '',
  ].join('\n');
}

function hash(text: string): string {
  return `sha256-${createHash('sha256').update(text, 'utf8').digest('base64')}`;
}
