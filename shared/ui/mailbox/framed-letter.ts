/** What may be fetched from within a letter: nothing. Its own styles are inline. */
const policy = "default-src 'none'; style-src 'unsafe-inline'";

/**
 * The HTML of a letter for a frame of its own: it fetches nothing, whatever it names, and its links open beside this page
 * as those of a mailbox do.
 */
export function framedLetter(html: string): string {
  const own = `<meta http-equiv="Content-Security-Policy" content="${policy}"><base target="_blank">`;
  const head = /<head[^>]*>/i.exec(html);
  if (!head) return own + html;
  const end = head.index + head[0].length;
  return html.slice(0, end) + own + html.slice(end);
}
