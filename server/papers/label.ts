import { create } from 'qrcode';
import { labelSize, layoutLabel, type LabelInput } from '@/shared/contract/label-layout';
import { bytesOf, drawMark, MM, newPdf, put, type Pdf } from './page';

/** Modules of a quiet zone, as the standard asks for. */
const QUIET = 4;

/**
 * The label of 62 × 40 mm, black on white, laid out as on the screen.
 * @param url what its QR code (level M) opens
 * @param at when the module was found ready, epoch ms
 */
export function drawLabel(label: LabelInput, url: string, at: number): Promise<Buffer> {
  const pdf = newPdf(`Label, ${label.title}, ${label.spare}`, at);
  pdf.addPage({ size: [labelSize.width * MM, labelSize.height * MM], margin: 0 });
  const { texts, rule, qr, mark } = layoutLabel(label);
  drawCode(pdf, url, { x: qr.x * MM, y: qr.y * MM, size: qr.size * MM });
  pdf
    .lineWidth(rule.stroke * MM)
    .strokeColor('black')
    .moveTo(rule.x0 * MM, rule.y * MM)
    .lineTo(rule.x1 * MM, rule.y * MM)
    .stroke();
  pdf.fillColor('black');
  for (const { text, x, y, size, weight, align } of texts)
    put(pdf, text, x * MM, y * MM, {
      face: weight === '600' ? 'num-600' : 'num-500',
      size: size * MM,
      align: align === 'end' ? 'right' : 'left',
    });
  drawMark(pdf, mark.x * MM, mark.y * MM, mark.size * MM);
  return bytesOf(pdf);
}

/** Dark modules as one path, those that follow each other in a row as one box: no seams between them. */
function drawCode(pdf: Pdf, url: string, box: { x: number; y: number; size: number }): void {
  const { modules } = create(url, { errorCorrectionLevel: 'M' });
  const unit = box.size / (modules.size + 2 * QUIET);
  for (let row = 0; row < modules.size; row += 1)
    for (let column = 0; column < modules.size; column += 1) {
      const from = column;
      while (column < modules.size && modules.get(row, column)) column += 1;
      if (column > from)
        pdf.rect(box.x + (from + QUIET) * unit, box.y + (row + QUIET) * unit, (column - from) * unit, unit);
    }
  pdf.fillColor('black').fill();
}
