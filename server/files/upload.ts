import type { Request, Response } from 'express';
import multer, { MulterError } from 'multer';
import type { Endpoint } from '../../shared/endpoint.ts';
import { limits } from '../../shared/limits.ts';
import { AppError } from '../errors.ts';

export type UploadedFile = { readonly name: string; readonly bytes: Uint8Array };

/** The file and the JSON of the field `data` of a multipart request. Nothing is written to disk; caps hold while it streams in. */
export async function readUpload(
  request: Request,
  response: Response,
  file: NonNullable<Endpoint['file']>,
): Promise<{ file: UploadedFile | null; data: unknown }> {
  const parse = multer({
    storage: multer.memoryStorage(),
    limits: { fileSize: file.maxBytes, files: 1, fields: 1, parts: 2, fieldSize: limits.jsonBytes, fieldNameSize: 50 },
    // Names come as UTF-8 from browsers; the parser's own default is Latin-1.
    defParamCharset: 'utf8',
  }).single(file.field);
  await new Promise<void>((resolve, reject) => {
    parse(request, response, (error: unknown) => {
      if (!error) resolve();
      else reject(asUploadError(error, file.maxBytes));
    });
  });
  const fields = (request.body ?? {}) as Record<string, unknown>; // multer's body is typed as any
  return {
    file: request.file ? { name: safeName(request.file.originalname), bytes: request.file.buffer } : null,
    data: typeof fields.data === 'string' ? parseJson(fields.data) : undefined,
  };
}

function asUploadError(error: unknown, maxBytes: number): Error {
  if (error instanceof MulterError) {
    if (error.code === 'LIMIT_FILE_SIZE') {
      return new AppError(
        'too-large',
        `The file has more than the ${maxBytes / 1024 / 1024} MiB that are taken. Make it smaller, or choose another.`,
      );
    }
    return new AppError('bad-request', 'One file and the field `data` are taken, nothing else.');
  }
  // The multipart parser's own complaints about torn or endless input.
  return new AppError('bad-request', 'The form data could not be read.');
}

function parseJson(text: string): unknown {
  try {
    return JSON.parse(text) as unknown; // JSON.parse is typed as any
  } catch {
    throw new AppError('bad-request', 'The field `data` is not JSON.');
  }
}

/** A file's own name, fit to be shown: no folders, no control characters, not endless. */
function safeName(name: string): string {
  const last = name.split(/[\\/]/).at(-1) ?? '';
  const clean = last.replace(/[\u0000-\u001f\u007f]/g, '').trim();
  return clean === '' ? 'unnamed' : clean.slice(-255);
}
