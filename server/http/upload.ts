import type { Request, RequestHandler } from 'express';
import multer from 'multer';
import type { Endpoint } from '../../shared/contracts/endpoint.ts';
import { DomainError } from '../../shared/errors.ts';

export interface Upload {
  fileName: string;
  content: Buffer;
}

type UploadRule = NonNullable<Endpoint['upload']>;

/** Takes one multipart file into memory, within the endpoint's limits. */
export function receiveUpload(rule: UploadRule): RequestHandler {
  return multer({
    storage: multer.memoryStorage(),
    limits: { fileSize: rule.maxBytes, files: 1, fields: 50, fieldSize: 100_000 },
  }).single(rule.field);
}

/** @throws {DomainError} where the file is missing or of a type that the endpoint does not take */
export function uploadOf(request: Request, rule: UploadRule): Upload {
  const { file } = request;
  if (!file) {
    throw new DomainError('input.invalid', 'Choose a file.', {
      fields: [{ path: rule.field, message: 'Choose a file.' }],
    });
  }
  if (!rule.types.includes(file.mimetype)) {
    throw new DomainError('upload.wrong_type', `This kind of file can't be read here. Use ${rule.types.join(', ')}.`, {
      fields: [{ path: rule.field, message: 'Choose another kind of file.' }],
    });
  }
  return { fileName: file.originalname, content: file.buffer };
}
