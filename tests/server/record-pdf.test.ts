/** The record on paper: read back as text with pdftotext, and compared with the signed JSON it was made from. */
import { execFileSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import type { Verdict } from '../../shared/contracts/calibrations.ts';
import { benchUnit, changeWords, stateFigures } from '../../shared/format/calibration-words.ts';
import { formatNumber } from '../../shared/format/numbers.ts';
import { calibrationRecordPdf } from '../../server/reports/calibration-record-pdf.ts';
import type { SignedRecord } from '../../server/reports/record-content.ts';
import { recordContent, signedRecord } from '../support/signed-record.ts';

/** The text of each page, with every kind of space as one. */
async function pagesOf(signed: SignedRecord, order: '-layout' | '-raw' = '-layout'): Promise<string[]> {
  const folder = mkdtempSync(join(tmpdir(), 'saltmark-pdf-'));
  try {
    const file = join(folder, 'record.pdf');
    writeFileSync(file, await calibrationRecordPdf(signed));
    const text = execFileSync('pdftotext', [order, '-enc', 'UTF-8', file, '-'], { encoding: 'utf8' });
    return text.split('\f').slice(0, -1).map(plain);
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}
const plain = (text: string): string => text.replace(/[\s\u2009\u00a0]+/g, ' ');

describe('the calibration record as PDF', () => {
  const signed = signedRecord();
  const { judgement } = signed.record;

  it('is the same file for the same record', async () => {
    const [one, other] = [await calibrationRecordPdf(signed), await calibrationRecordPdf(signedRecord())];
    expect(one.equals(other)).toBe(true);
    expect(one.subarray(0, 5).toString()).toBe('%PDF-');
  });

  it('carries its number and "page x of y" on every page', async () => {
    const pages = await pagesOf(signed);
    expect(pages.length).toBeGreaterThan(1);
    for (const [index, page] of pages.entries()) {
      expect(page).toContain('SP-2026-0418');
      expect(page).toContain(`page ${index + 1} of ${pages.length}`);
      expect(page).toContain('Calibration record');
    }
  });

  it('shows the figures of the signed JSON, rounded by the rule of the screen', async () => {
    const text = (await pagesOf(signed)).join(' ');
    const verdicts: Verdict[] = [judgement.asFound!, judgement.cleaned!, judgement.asLeft!];
    const unit = benchUnit(verdicts.map(({ meanUsCm }) => meanUsCm));
    for (const verdict of verdicts) {
      const { probe, reference, error, uncertainty } = stateFigures(verdict, unit);
      expect(text).toContain(plain(`${probe} ${reference} ${error} ${uncertainty}`));
    }
    for (const part of judgement.asLeft!.budget)
      expect(text).toContain(
        plain(formatNumber(part.standardUncertaintyPercent, { decimals: 2, unit: '%' })),
      );
    expect(text).toContain(plain(changeWords(judgement.fouling!)));
    expect(text).toContain('0.50120 cm−1, adjusted to 0.50980 cm−1');
  });

  it('states the outcome with its rule, its risk and its guard band', async () => {
    const [first] = await pagesOf(signed);
    expect(first).toContain('Within, clear. As left error');
    expect(first).toMatch(/tolerance less guard band, 2 − 0\.\d\d = 1\.\d\d %/);
    expect(first).toContain('Probability that the true error lies outside: < 1 %');
  });

  it('names lot, certificate, bottle, thermometer, permit, people, meanings and hash', async () => {
    const text = (await pagesOf(signed)).join(' ');
    for (const said of ['Bottle KC-26-031/07', 'Lot KC-26-031', 'KC-26-050', 'Thermometer RT-05', 'W-1187'])
      expect(text).toContain(said);
    expect(text).toContain('SHA-256 abababababababab');
    for (const said of ['Ines Falk', 'field technician', 'I performed this work as recorded.', 'Tomas Reik'])
      expect(text).toContain(said);
    expect(text).toContain('1 Dec 2026 14:11:36 UTC+00:00');
    // In the order it was written, a hash broken over lines stands in one piece.
    const written = (await pagesOf(signed, '-raw')).join(' ').replaceAll(' ', '');
    expect(written.split(signed.recordHash)).toHaveLength(4);
  });

  it('keeps the excluded replicate, with who excluded it and why', async () => {
    const text = (await pagesOf(signed)).join(' ');
    const excluded = recordContent().captures.find((capture) => capture.excluded !== null)!;
    expect(text).toContain(plain(formatNumber(excluded.conductivityUsCm, { decimals: 1 })));
    expect(text).toMatch(/Excluded by Ines Falk: bubble on the cell/);
    expect(text).toContain('1 excluded, kept and struck through.');
  });

  it('recommends no interval unless the site has agreed to it', async () => {
    expect((await pagesOf(signed)).join(' ')).not.toMatch(/next due|1 Mar 2027/i);
    const agreed = (await pagesOf(signedRecord({ dueOn: '2027-03-01' }))).join(' ');
    expect(agreed).toContain('Next due 1 Mar 2027');
  });

  it('calls itself a record, in-house and no certificate', async () => {
    const text = (await pagesOf(signed)).join(' ');
    expect(text).toContain('in-house calibration record and no certificate of an accredited laboratory');
    expect(text).not.toMatch(/\b(pass|fail|certified|accredited calibration of)\b/i);
  });

  it('leaves out no character of any script that a name may have', async () => {
    const names = 'Åse Ødegård Łukasz Đorđe Ελένη Дмитрий Việt µ κ Λ → ≤ ≥ cm⁻¹ Eₙ ½ ‰ “ ” … № 中';
    const record = recordContent({ point: { ...recordContent().point, name: names } });
    const text = (await pagesOf(signedRecord({ record }))).join(' ');
    const shown = 'Åse Ødegård Łukasz Đorđe Ελένη Дмитрий Việt';
    expect(text.normalize('NFC')).toContain(shown.normalize('NFC'));
    expect(text).toMatch(/[µμ] κ Λ to at most at least/);
    // What no bundled font has is written as its code.
    expect(text).toContain('[U+4E2D]');
    for (const mark of ['½', '[U+2030]', '“', '”', '…']) expect(text).toContain(mark);
  });

  it('prints an amendment under a number of its own, beside what it amends', async () => {
    const { judgement: same, site, point, probe, organisation } = recordContent();
    const text = (
      await pagesOf(
        signedRecord({
          amends: 'SP-2026-0418',
          record: {
            kind: 'amendment',
            number: 'SP-2026-0420',
            organisation,
            site,
            point,
            probe,
            amends: { number: 'SP-2026-0418', recordHash: signed.recordHash },
            aspect: 'Permit number',
            text: 'The permit was W-1178.',
            reason: 'Two digits were swapped',
            author: { id: 1, name: 'Ines Falk' },
            signedAt: '2026-12-02T09:00:00Z',
            judgement: same,
            cellConstantBeforePerCm: 0.5012,
            cellConstantAfterPerCm: 0.5098,
            remark: 'The record named above stays as it was signed; this amendment is read with it.',
          },
        }),
      )
    ).join(' ');
    for (const said of [
      'SP-2026-0420',
      'amends SP-2026-0418',
      'The permit was W-1178.',
      'Two digits were swapped',
    ])
      expect(text).toContain(said);
  });
});
