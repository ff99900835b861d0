/** The weekly digest as a letter, and the address that ends it. */
import type { Letter } from '../../alerts/ways/letter';
import type { DigestWords } from '../../entities/weekly-digest';
import { mark, sameText, type Secrets } from '../secrets';

const escaped = (text: string): string =>
  text.replace(/[&<>"']/g, (sign) => `&#${sign.charCodeAt(0)};`).replaceAll('\u00a0', '&nbsp;');

/** By what a digest's letter is known outside. */
export const letterId = (digestId: string): string => `digest.${digestId}`;

/** @param links null: the server does not know its address */
export function digestLetter(
  { week, facts }: DigestWords,
  workshop: string,
  links: { waits: string; stop: string } | null,
): Letter {
  const title = `Waits of ${week}`;
  const footer = `${workshop}. Three facts of the week that changed most.`;
  const stop = 'No more of these letters';
  const rest = 'Open Bidewell under Waits for the rest.';
  const switchedOff = 'They are switched off in Bidewell under More.';
  const text = [
    title,
    ...facts.map((fact) => `– ${fact}`),
    links === null ? rest : `Open the waits: ${links.waits}`,
    footer,
    links === null ? switchedOff : `${stop}: ${links.stop}`,
  ];
  const paragraph = (html: string, style = ''): string => `<p style="margin:0 0 12px;${style}">${html}</p>`;
  const small = 'font-size:13px;color:#4a5654';
  const html = [
    '<!doctype html><html lang="en"><head><meta charset="utf-8">',
    `<title>${escaped(title)}</title></head>`,
    '<body style="margin:0;padding:24px;font:16px/1.5 sans-serif;color:#16201f;background:#ffffff">',
    `<h1 style="margin:0 0 12px;font-size:22px">${escaped(title)}</h1>`,
    `<ul style="margin:0 0 12px;padding-left:20px">${facts.map((fact) => `<li>${escaped(fact)}</li>`).join('')}</ul>`,
    paragraph(links === null ? rest : `<a href="${escaped(links.waits)}">Open the waits in Bidewell</a>`),
    paragraph(escaped(footer), small),
    paragraph(links === null ? switchedOff : `<a href="${escaped(links.stop)}">${stop}</a>`, small),
    '</body></html>',
  ].join('\n');
  return { subject: title, text: `${text.join('\n\n')}\n`, html };
}

/** The link's word: whose it is, and that it is ours. It opens nothing but the end of the digest, and so lasts. */
export const digestToken = ({ digestKey }: Pick<Secrets, 'digestKey'>, personId: string): string =>
  `${personId}.${mark(digestKey, personId)}`;

/** Whose link it is; null: it is none of ours. */
export function personOfToken({ digestKey }: Pick<Secrets, 'digestKey'>, token: string): string | null {
  const dot = token.lastIndexOf('.');
  const personId = token.slice(0, dot);
  return dot > 0 && sameText(token.slice(dot + 1), mark(digestKey, personId)) ? personId : null;
}
