/** A4 and its measures, in points. What the look states in px of a 794 px page is three quarters of a point. */
import PDFDocument from 'pdfkit';

export type Paper = InstanceType<typeof PDFDocument>;

export const PAGE = { width: 595.28, height: 841.89 } as const;
export const MARGIN = 45;
export const CONTENT_WIDTH = PAGE.width - 2 * MARGIN;
/** Where text begins under the head, and where it ends above the foot. */
export const TOP = 92;
export const BOTTOM = PAGE.height - 62;
export const px = (value: number): number => value * 0.75;

/** The printed theme: ink on white. */
export const INK = {
  ink: '#0b2a32',
  say: '#3b545c',
  quiet: '#53666c',
  rule: '#cdcabc',
  edge: '#74858a',
  sheet: '#ffffff',
  care: '#764503',
  stop: '#8a1446',
  hatchIn: '#4c666d',
  hatchOut: '#8c9a9b',
  kelp: '#0a625b',
} as const;

export interface PaperFacts {
  title: string;
  subject: string;
  /** The only time in the file: the same record gives the same bytes. */
  createdAt: Date;
}

export function newPaper({ title, subject, createdAt }: PaperFacts): Paper {
  return new PDFDocument({
    size: 'A4',
    margin: 0,
    autoFirstPage: false,
    bufferPages: true,
    pdfVersion: '1.7',
    lang: 'en-GB',
    displayTitle: true,
    info: {
      Title: title,
      Subject: subject,
      Creator: 'Saltmark',
      Producer: 'Saltmark',
      CreationDate: createdAt,
    },
  });
}

export function bytesOf(paper: Paper): Promise<Buffer> {
  return new Promise((resolve, reject) => {
    const chunks: Buffer[] = [];
    paper.on('data', (chunk: Buffer) => void chunks.push(chunk));
    paper.on('end', () => resolve(Buffer.concat(chunks)));
    paper.on('error', reject);
    paper.end();
  });
}
