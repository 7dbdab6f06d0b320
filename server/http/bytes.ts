/** Bodies and answers that are files. */
import { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import { raw, type Request, type Response } from 'express';
import { AppError } from '../errors.ts';
import type { ByteAnswer, ByteBody } from './route.ts';

/** Reads the body into `request.body`; nothing larger than allowed is ever held in memory. */
export async function readBytes(request: Request, response: Response, allowed: ByteBody): Promise<void> {
  const read = raw({ type: [...allowed.mediaTypes], limit: allowed.largestBytes });
  await new Promise<void>((resolve, reject) => {
    read(request, response, (error?: unknown) => {
      if (!error) return resolve();
      const isTooLarge = (error as { type?: string }).type === 'entity.too.large';
      reject(isTooLarge ? new AppError(allowed.tooLarge) : (error as Error));
    });
  });
  if (!Buffer.isBuffer(request.body)) request.body = Buffer.alloc(0);
}

/** Only letters that every browser reads the same; the full name follows encoded [RFC 6266, 4.3; RFC 8187]. */
function dispositionOf(fileName: string): string {
  const plain = fileName.replace(/[^\x20-\x7e]|["\\%]/g, '_');
  const encoded = encodeURIComponent(fileName).replace(
    /['()*]/g,
    (mark) => `%${mark.charCodeAt(0).toString(16)}`,
  );
  return `attachment; filename="${plain}"; filename*=UTF-8''${encoded}`;
}

/** What people uploaded is never run: fixed type, no sniffing, nothing of it may load or act. */
export async function sendBytes(
  response: Response,
  { mediaType, bytes, fileName }: ByteAnswer,
): Promise<void> {
  response.set('content-type', mediaType);
  response.set('x-content-type-options', 'nosniff');
  response.set('content-security-policy', "default-src 'none'; style-src 'unsafe-inline'; sandbox");
  if (fileName !== undefined) response.set('content-disposition', dispositionOf(fileName));
  if (!(bytes instanceof Readable)) return void response.end(bytes);
  // A reader that goes away closes the stream, and with it the file behind it.
  await pipeline(bytes, response).catch((error: NodeJS.ErrnoException) => {
    if (error.code !== 'ERR_STREAM_PREMATURE_CLOSE') throw error;
  });
}
