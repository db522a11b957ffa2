import type { RequestHandler } from 'express';
import multer from 'multer';
import { Refusal } from '../../http/errors';

const MEGABYTE = 1024 * 1024;

/** Takes one uploaded file in the field `file` into memory; a larger one than 5 MB is refused while it comes in. */
export function takeFile(): RequestHandler {
  return multer({
    storage: multer.memoryStorage(),
    limits: { fileSize: 5 * MEGABYTE, files: 1, fields: 0, parts: 2, headerPairs: 20 },
  }).single('file');
}

/** The text of an upload; refused where it is no text. */
export function textOf(file: Express.Multer.File | undefined): string {
  if (!file) throw new Refusal('malformed-request', 'There was no file. Choose a production file (.yaml) and send it again.');
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(file.buffer);
  } catch (error) {
    if (!(error instanceof TypeError)) throw error;
    throw new Refusal('wrong-fields', 'This is no text file in UTF-8. Choose a production file (.yaml), or save it as UTF-8 first.');
  }
}
