/** Certificate files of the demonstration: one valid PDF page of text each, stored as an upload would be. */
import { createHash } from 'node:crypto';
import { Certificate } from '../../server/db/models/index.ts';
import { need, type Loading } from './loading.ts';

/** Standard fonts of a PDF know Latin letters only; brackets and backslashes are escaped [ISO 32000-1, 7.3.4.2]. */
const pdfText = (line: string): string =>
  line
    .normalize('NFKD')
    .replace(/[^\x20-\x7e]/g, '')
    .replace(/[\\()]/g, '\\$&');

/** Characters that fit across a page of A4 in 11 points. */
const lineLength = 84;

function wrapped(line: string): string[] {
  const parts = pdfText(line).match(new RegExp(`.{1,${lineLength}}(\\s|$)`, 'g')) ?? [''];
  return parts.map((part) => part.trimEnd());
}

/** One page of A4; offsets in the cross-reference table are true, so that every reader opens it. */
export function pdfOf(lines: readonly string[]): Buffer {
  const shown = lines.flatMap(wrapped).map((line) => `(${line}) Tj T*`);
  const stream = `BT /F1 11 Tf 16 TL 56 780 Td ${shown.join(' ')} ET`;
  const objects = [
    '<< /Type /Catalog /Pages 2 0 R >>',
    '<< /Type /Pages /Kids [3 0 R] /Count 1 >>',
    '<< /Type /Page /Parent 2 0 R /MediaBox [0 0 595 842] /Contents 4 0 R /Resources << /Font << /F1 5 0 R >> >> >>',
    `<< /Length ${stream.length} >>\nstream\n${stream}\nendstream`,
    '<< /Type /Font /Subtype /Type1 /BaseFont /Helvetica >>',
  ];
  let text = '%PDF-1.4\n';
  const offsets = objects.map((body, index) => {
    const offset = text.length;
    text += `${index + 1} 0 obj\n${body}\nendobj\n`;
    return offset;
  });
  const start = text.length;
  const table = offsets.map((offset) => `${String(offset).padStart(10, '0')} 00000 n \n`).join('');
  text += `xref\n0 ${objects.length + 1}\n0000000000 65535 f \n${table}`;
  text += `trailer\n<< /Size ${objects.length + 1} /Root 1 0 R >>\nstartxref\n${start}\n%%EOF\n`;
  return Buffer.from(text, 'latin1');
}

/** Keeps a file as an upload would and answers its row. */
export async function storeCertificate(
  loading: Loading,
  file: { fileName: string; lines: readonly string[]; at: number },
): Promise<number> {
  const content = pdfOf(file.lines);
  const facts = {
    sha256: createHash('sha256').update(content).digest('hex'),
    mediaType: 'application/pdf',
    byteCount: content.length,
    fileName: file.fileName,
  };
  const row = await Certificate.create({
    ...facts,
    content,
    uploadedAt: new Date(file.at),
    uploadedBy: need(loading.users, 'tomas'),
  });
  loading.trail.push({
    action: 'certificates.uploaded',
    objectKind: 'certificates',
    objectId: row.id,
    siteId: null,
    newValue: facts,
    at: file.at,
    by: 'tomas',
  });
  return row.id;
}
