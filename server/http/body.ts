import {json, type Request, type RequestHandler, type Response} from 'express';
import multer, {MulterError} from 'multer';
import {AppError} from '../errors';

/** Largest JSON body [B]. */
export const MAX_JSON_BYTES = 64 * 1024;

/** The one file of an upload. */
export interface UploadedFile {
  readonly name: string;
  readonly bytes: Buffer;
}

/** What body-parser calls a body that is broken, cut off or not as long as it said. */
const NOT_JSON = new Set(['entity.parse.failed', 'request.size.invalid', 'request.aborted']);

const parseJson = json({limit: MAX_JSON_BYTES, strict: true});

/** Reads the JSON body, where there is one. */
export async function readJson(req: Request, res: Response): Promise<void> {
  if (!hasBody(req)) return;
  if (!req.is('application/json')) {
    throw new AppError('unsupported-media', {detail: 'Send application/json.'});
  }
  try {
    await passThrough(parseJson, req, res);
  } catch (error) {
    throw refusalOf(error) ?? error; // errors of body-parser carry `type`
  }
}

/** Reads a multipart body with its one file in the field `file`. */
export async function readFile(
  req: Request,
  res: Response,
  maxBytes: number,
): Promise<UploadedFile> {
  if (!req.is('multipart/form-data')) {
    throw new AppError('unsupported-media', {detail: 'Send multipart/form-data.'});
  }
  const limits = {fileSize: maxBytes, files: 1, fields: 20, fieldSize: MAX_JSON_BYTES, parts: 21};
  try {
    await passThrough(multer({storage: multer.memoryStorage(), limits}).single('file'), req, res);
  } catch (error) {
    throw refusalOf(error) ?? error; // MulterError
  }
  if (!req.file) {
    const errors = [{path: 'file', message: 'One file in the field "file" is needed.'}];
    throw new AppError('invalid-input', {errors});
  }
  return {name: req.file.originalname, bytes: req.file.buffer};
}

function hasBody(req: Request): boolean {
  return (
    req.headers['transfer-encoding'] !== undefined || Number(req.headers['content-length']) > 0
  );
}

function passThrough(middleware: RequestHandler, req: Request, res: Response): Promise<void> {
  return new Promise((resolve, reject) => {
    void middleware(req, res, (error?: unknown) => {
      if (error === undefined) resolve();
      else
        reject(
          error instanceof Error ? error : new Error('a body could not be read', {cause: error}),
        );
    });
  });
}

function refusalOf(error: unknown): AppError | undefined {
  if (error instanceof MulterError) {
    if (error.code === 'LIMIT_FILE_SIZE') {
      return new AppError('body-too-large', {detail: 'The file is too large.'});
    }
    const errors = [{path: error.field ?? 'file', message: error.message}];
    return new AppError('invalid-input', {errors});
  }
  const type = (error as {type?: unknown}).type;
  if (type === 'entity.too.large') {
    return new AppError('body-too-large', {
      detail: `At most ${MAX_JSON_BYTES / 1024} kB may be sent at once.`,
    });
  }
  if (type === 'encoding.unsupported' || type === 'charset.unsupported') {
    return new AppError('unsupported-media', {detail: (error as Error).message});
  }
  if (typeof type === 'string' && NOT_JSON.has(type)) {
    const errors = [{path: 'body', message: (error as Error).message}];
    return new AppError('invalid-input', {detail: 'The body is not JSON.', errors});
  }
  return undefined;
}
