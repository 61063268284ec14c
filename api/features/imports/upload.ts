/** Takes the uploaded file: to a temporary folder first, because nothing is stored before it was looked at. */
import { createHash } from 'node:crypto';
import { createReadStream } from 'node:fs';
import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { pipeline } from 'node:stream/promises';
import type { Request, Response } from 'express';
import multer, { MulterError } from 'multer';
import { Problem } from '../../http/problems.ts';

export const LARGEST_FILE_MEGABYTES = 200;

export type Upload = { path: string; name: string; size: number; fields: Record<string, string> };

/** Gives the uploaded file to `use` and removes it afterwards, whatever happens. */
export async function withUpload<T>(
  req: Request,
  res: Response,
  use: (upload: Upload) => Promise<T>,
): Promise<T> {
  const folder = await mkdtemp(join(tmpdir(), 'tetherline-upload-'));
  try {
    await receive(req, res, folder);
    if (!req.file) throw new Problem('import_file_missing');
    return await use({
      path: req.file.path,
      // Browsers send the name as UTF-8 bytes; the parser hands them over as latin-1.
      name: Buffer.from(req.file.originalname, 'latin1').toString('utf8').slice(0, 200),
      size: req.file.size,
      fields: { ...(req.body as Record<string, string>) },
    });
  } finally {
    await rm(folder, { recursive: true, force: true });
  }
}

function receive(req: Request, res: Response, folder: string): Promise<void> {
  const take = multer({
    storage: multer.diskStorage({
      destination: folder,
      filename: (_req, _file, done) => done(null, 'upload'),
    }),
    limits: {
      fileSize: LARGEST_FILE_MEGABYTES * 1024 * 1024,
      files: 1,
      fields: 10,
      fieldSize: 10_000,
    },
  }).single('file');
  return new Promise((resolve, reject) => {
    take(req, res, (error: unknown) => {
      if (!error) resolve();
      else if (error instanceof MulterError && error.code === 'LIMIT_FILE_SIZE') {
        reject(new Problem('import_file_too_large', { megabytes: LARGEST_FILE_MEGABYTES }));
      } else reject(new Problem('malformed_request', {}, { cause: error }));
    });
  });
}

export async function sha256OfFile(path: string): Promise<string> {
  const hash = createHash('sha256');
  await pipeline(createReadStream(path), hash);
  return hash.digest('hex');
}
