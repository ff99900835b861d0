/** An alert as an e-mail: the same words as text and as HTML, with a link where the server knows its address. */
import type { Message } from '../message';

export interface Letter {
  subject: string;
  text: string;
  html: string;
}

const escaped = (text: string): string =>
  text.replace(/[&<>"']/g, (mark) => `&#${mark.charCodeAt(0)};`).replaceAll('\u00a0', '&nbsp;');

const tones: Record<Message['level'], string> = { tell: '#2b3a42', amber: '#8a5a00', alarm: '#a3161f' };

/** @param site address that people open; null: the server does not know it, and the letter has no link */
export function letterOf(message: Message, site: string | null): Letter {
  const { name, title, seen, checkFirst, late, raised, workshop, level, path } = message;
  const link = site === null ? null : new URL(path, site).href;
  const times = [raised, late].filter(Boolean).join(' ');
  const footer = `${workshop}. Where your alerts go is set in Bidewell under More.`;
  const lines = [
    `${name}: ${title}`,
    seen,
    ...(checkFirst === '' ? [] : [`Check first: ${checkFirst}`]),
    times,
    link === null ? 'Open Bidewell to take it.' : `Open it: ${link}`,
  ];
  const paragraph = (html: string, style = ''): string => `<p style="margin:0 0 12px;${style}">${html}</p>`;
  const html = [
    '<!doctype html><html lang="en"><head><meta charset="utf-8">',
    `<title>${escaped(`${name}: ${title}`)}</title></head>`,
    '<body style="margin:0;padding:24px;font:16px/1.5 sans-serif;color:#16201f;background:#ffffff">',
    paragraph(`<strong style="color:${tones[level]}">${escaped(name)}</strong>`),
    `<h1 style="margin:0 0 12px;font-size:22px">${escaped(title)}</h1>`,
    paragraph(escaped(seen)),
    ...(checkFirst === '' ? [] : [paragraph(`<strong>Check first:</strong> ${escaped(checkFirst)}`)]),
    paragraph(escaped(times)),
    paragraph(link === null ? 'Open Bidewell to take it.' : `<a href="${escaped(link)}">Open it in Bidewell</a>`),
    paragraph(escaped(footer), 'font-size:13px;color:#4a5654'),
    '</body></html>',
  ].join('\n');
  return { subject: `${name}: ${title}`, text: `${[...lines, footer].join('\n\n')}\n`, html };
}
