import type { ReactNode } from 'react';
import { createPortal } from 'react-dom';

/** Everything but the sheet is left out of the print; on screen the sheet is not there. */
const rules = (widthMm: number, heightMm: number) => `
.bw-print { display: none; }
@media print {
  @page { size: ${widthMm}mm ${heightMm}mm; margin: 0; }
  html, body { height: auto !important; overflow: visible !important; background: white !important; }
  body > *:not(.bw-print) { display: none !important; }
  .bw-print { display: block; width: ${widthMm}mm; height: ${heightMm}mm; overflow: hidden; }
  .bw-print svg { display: block; }
}`;

/** What is printed instead of the page, on paper of its own size. */
export const PrintSheet = ({
  widthMm,
  heightMm,
  children,
}: {
  widthMm: number;
  heightMm: number;
  children: ReactNode;
}) =>
  createPortal(
    <div className="bw-print" aria-hidden>
      <style>{rules(widthMm, heightMm)}</style>
      {children}
    </div>,
    document.body,
  );

/** Opens the browser's print sheet. */
export const printNow = (): void => window.print();
