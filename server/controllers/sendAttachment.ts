import type { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import type { Response } from 'express';

export interface Attachment {
  fileName: string;
  contentType: string;
  sizeBytes: number;
  content: Readable;
}

/** Sends a file to be kept, never shown: even one that holds a page or a script stays inert in the browser. */
export async function sendAttachment(response: Response, attachment: Attachment): Promise<void> {
  const { fileName, contentType, sizeBytes, content } = attachment;
  response.attachment(fileName);
  response.set({
    'Content-Type': contentType,
    'Content-Length': String(sizeBytes),
    'X-Content-Type-Options': 'nosniff',
    'Content-Security-Policy': "default-src 'none'; sandbox",
    // The length above is that of the bytes as stored.
    'Cache-Control': 'no-store, no-transform',
  });
  try {
    await pipeline(content, response);
  } catch (error) {
    // Whoever asked has gone: nothing is left to answer to.
    if (response.destroyed && !response.writableFinished && isPrematureClose(error)) return;
    throw error;
  }
}

const isPrematureClose = (error: unknown): boolean =>
  error instanceof Error && 'code' in error && error.code === 'ERR_STREAM_PREMATURE_CLOSE';
