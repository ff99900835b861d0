import { domElement } from '../primitives/dom-element';
import { framedLetter } from './framed-letter';

/** The HTML of a letter in a frame of its own: no script runs in it, and it reaches nothing of this page. */
export const MailFrame = ({ html, title }: { html: string; title: string }) =>
  domElement('iframe', {
    srcDoc: framedLetter(html),
    title,
    // Of all that a frame may do, only what a link needs: the page it opens is one like any other.
    sandbox: 'allow-popups allow-popups-to-escape-sandbox',
    referrerPolicy: 'no-referrer',
    style: { width: '100%', height: 420, borderWidth: 0, backgroundColor: '#ffffff' },
  });
