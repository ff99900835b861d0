import { Txt } from '../primitives/txt';

/** The HTML of a letter. Only the web has a frame that it is safe in. */
export const MailFrame = (_props: { html: string; title: string }) => (
  <Txt tone="ink2">The letter as HTML is shown in a browser.</Txt>
);
