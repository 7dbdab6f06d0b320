/** A bottle's label, 62 × 29 mm: what it is, until when, and its code to scan or to type. */
import QRCode from 'qrcode';
import { inHouseWords } from '../../../shared/contracts/preparations.ts';
import { formatDate } from '../../../shared/format/dates.ts';
import { formatNumber } from '../../../shared/format/numbers.ts';
import { labelOfLot } from '../standards/presenter.ts';
import type { BottleRow } from './queries.ts';

const widthMm = 62;
const heightMm = 29;
const codeMm = 23;
/** Modules of white that scanners need around the code [ISO/IEC 18004, 6.3.8]. */
const quietModules = 4;
/** Right of the code; a monospaced letter is 0.6 of its size wide. */
const textMm = 34.5;
const lineSizeMm = 2.1;
const lineLength = Math.floor(textMm / (0.6 * lineSizeMm));
const codeSizeMm = (code: string): number => Math.min(3.9, textMm / (0.6 * code.length));

const escaped = (text: string): string => text.replace(/[<>&"']/g, (mark) => `&#${mark.charCodeAt(0)};`);

/** Dark modules as one path, a run of a row at a time. */
function pathOf(text: string): { path: string; size: number } {
  const { modules } = QRCode.create(text, { errorCorrectionLevel: 'M' });
  const { size, data } = modules;
  const dark = Array.from({ length: size * size }, (_, at) => at).filter((at) => data[at]);
  const path = dark
    .map((at) => `M${(at % size) + quietModules} ${Math.floor(at / size) + quietModules}h1v1h-1z`)
    .join('');
  return { path, size: size + 2 * quietModules };
}

function wrapped(text: string): string[] {
  const lines: string[] = [];
  for (const word of text.split(/[ \u00a0]/)) {
    const last = lines.at(-1);
    if (last !== undefined && last.length + word.length < lineLength)
      lines[lines.length - 1] = `${last} ${word}`;
    else lines.push(word);
  }
  return lines.slice(0, 3);
}

/** Opening is often written by hand on the spot: the line for it is on every label. */
function lines(row: BottleRow): string[] {
  const opened = row.openedAt
    ? [`opened ${formatDate(row.openedAt)}`, `use by ${formatDate(row.useByOn)}`]
    : ['opened ____________________'];
  return [
    ...wrapped(labelOfLot(row)),
    ...(row.isInHouse ? [inHouseWords] : []),
    `${formatNumber(row.volumeMl)} mL, until ${formatDate(row.lotExpiresOn)}`,
    ...opened,
  ];
}

export function labelSvg(row: BottleRow): string {
  const { path, size } = pathOf(row.code);
  const text = lines(row)
    .map(
      (line, index) =>
        `<text x="26.5" y="${10 + index * 2.7}" font-size="${lineSizeMm}">${escaped(line)}</text>`,
    )
    .join('');
  return (
    `<svg xmlns="http://www.w3.org/2000/svg" width="${widthMm}mm" height="${heightMm}mm" viewBox="0 0 ${widthMm} ${heightMm}" role="img" aria-label="Label of bottle ${escaped(row.code)}">` +
    `<rect width="${widthMm}" height="${heightMm}" fill="#fff"/>` +
    `<svg x="2" y="3" width="${codeMm}" height="${codeMm}" viewBox="0 0 ${size} ${size}" shape-rendering="crispEdges"><path d="${path}" fill="#000"/></svg>` +
    `<g font-family="'Roboto Mono', ui-monospace, monospace" fill="#000"><text x="26.5" y="6.5" font-size="${codeSizeMm(row.code)}" font-weight="700">${escaped(row.code)}</text>${text}</g>` +
    '</svg>'
  );
}
