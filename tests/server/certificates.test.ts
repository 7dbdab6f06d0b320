import { createHash } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { Certificate, Instrument, Standard } from '../../server/db/models/index.ts';
import { startTestApp, type TestApp } from '../support/app.ts';
import { refusals } from '../support/refusals.ts';
import { aStandard, anInstrument } from '../support/rows.ts';

let app: TestApp;
let lot: Standard;
let thermometer: Instrument;

const pdf = Buffer.from('%PDF-1.4\n1 0 obj <<>> endobj\ntrailer <<>>\n%%EOF\n');
const png = Buffer.concat([
  Buffer.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a]),
  Buffer.from('the rest of it'),
]);
const send = async (content: Buffer, type = 'application/pdf', who: 'manager' | 'technician' = 'manager') =>
  (await app.as(who))
    .post('/api/certificates?fileName=KC-26-031%20certificate.pdf')
    .set('content-type', type)
    .send(content);

beforeAll(async () => {
  app = await startTestApp();
  lot = await aStandard({ code: 'KC-26-031' });
  thermometer = await anInstrument({ code: 'RT-05' });
});
afterAll(() => app.stop());
beforeEach(() => {
  app.events.length = 0;
});

const attach = { certificateId: 99_999, reason: 'scanned today' };

refusals(
  () => app,
  [
    {
      says: 'no session opens a file',
      who: null,
      ask: () => ['get', '/api/certificates/1'],
      code: 'sessions.required',
      status: 401,
    },
    {
      says: 'no file of that number',
      who: 'manager',
      ask: () => ['get', '/api/certificates/99999'],
      code: 'certificates.not-found',
      status: 404,
    },
    {
      says: 'an empty file',
      who: 'manager',
      ask: () => ['post', '/api/certificates?fileName=a.pdf'],
      code: 'certificates.type-unknown',
      status: 422,
    },
    {
      says: 'a file without a name',
      who: 'manager',
      ask: () => ['post', '/api/certificates'],
      code: 'request.invalid',
      status: 422,
      issue: 'query.fileName',
    },
    {
      says: 'a technician attaches none to a lot',
      who: 'technician',
      ask: () => ['post', `/api/standards/${lot.id}/certificate`, attach],
      code: 'standards.forbidden',
      status: 403,
    },
    {
      says: 'an auditor attaches none to an instrument',
      who: 'auditor',
      ask: () => ['post', `/api/instruments/${thermometer.id}/certificate`, attach],
      code: 'instruments.forbidden',
      status: 403,
    },
    {
      says: 'a lot takes no file that is not there',
      who: 'manager',
      ask: () => ['post', `/api/standards/${lot.id}/certificate`, attach],
      code: 'certificates.not-found',
      status: 404,
    },
    {
      says: 'an unknown lot takes none',
      who: 'manager',
      ask: () => ['post', '/api/standards/99999/certificate', attach],
      code: 'standards.not-found',
      status: 404,
    },
    {
      says: 'attaching without a reason',
      who: 'manager',
      ask: () => ['post', `/api/instruments/${thermometer.id}/certificate`, { certificateId: 1 }],
      code: 'request.invalid',
      status: 422,
      issue: 'reason',
    },
  ],
);

describe('certificate files', () => {
  it('are kept byte for byte, once, with their hash, and given back as a download', async () => {
    const { body, status } = await send(pdf);
    const sha256 = createHash('sha256').update(pdf).digest('hex');

    expect(status).toBe(201);
    expect(body).toMatchObject({
      sha256,
      mediaType: 'application/pdf',
      byteCount: pdf.length,
      fileName: 'KC-26-031 certificate.pdf',
      uploadedBy: 'Test manager',
    });
    expect(await app.audited('certificates.uploaded')).toMatchObject({
      objectId: String(body.id),
      newValue: { sha256, byteCount: pdf.length },
    });
    expect(app.events).toEqual([{ slice: 'certificates', id: body.id, kind: 'created', siteId: null }]);

    const again = await send(pdf);
    expect(again.body.id).toBe(body.id);
    expect(await Certificate.count({ where: { sha256 } })).toBe(1);

    const auditor = await app.as('auditor');
    const file = await auditor.get(`/api/certificates/${body.id}`).buffer().expect(200);
    expect(Buffer.compare(Buffer.isBuffer(file.body) ? file.body : Buffer.from(file.text), pdf)).toBe(0);
    expect(file.headers).toMatchObject({
      'content-type': 'application/pdf',
      'x-content-type-options': 'nosniff',
      'content-disposition': `attachment; filename="KC-26-031 certificate.pdf"; filename*=UTF-8''KC-26-031%20certificate.pdf`,
    });
    expect(file.headers['content-security-policy']).toContain('sandbox');
  });

  it('are known by their content, not by what the sender calls them', async () => {
    expect((await send(png, 'application/pdf')).body.mediaType).toBe('image/png');
    const page = await send(Buffer.from('<html><script>alert(1)</script>'), 'application/pdf');
    expect(page.body).toMatchObject({ code: 'certificates.type-unknown', status: 422 });
  });

  it('are refused above 10 MB, from other sites, in other types and from people who add none', async () => {
    const large = Buffer.concat([pdf, Buffer.alloc(10 * 1024 * 1024)]);
    const before = await Certificate.count();
    expect((await send(large)).body).toMatchObject({ code: 'certificates.too-large', status: 422 });
    expect((await send(pdf, 'text/html')).body.code).toBe('request.unparsable');
    expect((await send(Buffer.from('%PDF-1.4 other'), 'application/pdf', 'technician')).body.code).toBe(
      'certificates.forbidden',
    );
    const agent = await app.as('manager');
    const forged = await agent
      .post('/api/certificates?fileName=a.pdf')
      .set('content-type', 'application/pdf')
      .set('origin', 'https://elsewhere.example')
      .send(pdf);
    expect(forged.body.code).toBe('request.forgery-suspected');
    // The exception holds for this one address.
    const elsewhere = await agent.post('/api/standards').set('content-type', 'application/pdf').send(pdf);
    expect(elsewhere.body.code).toBe('request.unparsable');
    expect(await Certificate.count()).toBe(before);
  });

  it('are attached to a lot and to an instrument, with a reason', async () => {
    const { body: file } = await send(pdf);
    const agent = await app.as('manager');
    app.events.length = 0;

    const { body } = await agent
      .post(`/api/standards/${lot.id}/certificate`)
      .send({ certificateId: file.id, reason: 'scanned today' })
      .expect(200);

    expect(body).toMatchObject({ certificate: { id: file.id, sha256: file.sha256 }, version: 1 });
    expect((await Standard.findByPk(lot.id))?.certificateId).toBe(file.id);
    expect(await app.audited('standards.certificate-attached')).toMatchObject({
      oldValue: { certificateId: null },
      newValue: { certificateId: file.id, sha256: file.sha256 },
      reason: 'scanned today',
    });
    expect(app.events).toEqual([{ slice: 'standards', id: lot.id, kind: 'changed', siteId: null }]);

    const attached = await agent
      .post(`/api/instruments/${thermometer.id}/certificate`)
      .send({ certificateId: file.id, reason: 'new certificate' })
      .expect(200);
    expect(attached.body.certificate.fileName).toBe('KC-26-031 certificate.pdf');
    expect((await Instrument.findByPk(thermometer.id))?.certificateId).toBe(file.id);
    expect(await app.audited('instruments.certificate-attached')).toMatchObject({
      reason: 'new certificate',
    });
  });
});
