import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import {
  type CallHandler,
  type ExecutionContext,
  Injectable,
  type NestInterceptor,
  type OnModuleDestroy,
} from '@nestjs/common';
import type { Request, Response } from 'express';
import multer, { MulterError } from 'multer';
import { finalize, type Observable } from 'rxjs';
import { AppError, badInput } from '../../http/app-error.js';
import { MAX_UPLOAD_BYTES } from '../../media/limits.js';

const FIELD = 'file';

/**
 * Takes one file of a multipart request onto disk, so that its bytes never gather in memory, and removes it
 * once the route has answered. Runs after the guards: nobody fills the disk who may not upload.
 */
@Injectable()
export class UploadInterceptor implements NestInterceptor, OnModuleDestroy {
  private folder: Promise<string> | null = null;
  private readonly read = multer({
    storage: multer.diskStorage({
      destination: (_request, _file, done) => {
        this.tempFolder().then(
          (folder) => done(null, folder),
          (error: Error) => done(error, ''),
        );
      },
    }),
    defParamCharset: 'utf8',
    limits: {
      fileSize: MAX_UPLOAD_BYTES,
      files: 1,
      fields: 4,
      parts: 5,
      fieldSize: 2000,
      fieldNameSize: 100,
      headerPairs: 20,
      fieldNestingDepth: 0,
    },
  }).single(FIELD);

  async intercept(context: ExecutionContext, next: CallHandler): Promise<Observable<unknown>> {
    const http = context.switchToHttp();
    const request = http.getRequest<Request>();
    if (!request.is('multipart/form-data'))
      throw new AppError(415, 'not-multipart', 'Send the file as multipart/form-data.');
    await this.receive(request, http.getResponse<Response>());
    const { file } = request;
    // One form to the route: the file among its fields. What a field of that name said is overwritten.
    request.body = { ...request.body, [FIELD]: file };
    return next.handle().pipe(
      finalize(() => {
        if (file) void rm(file.path, { force: true });
      }),
    );
  }

  async onModuleDestroy(): Promise<void> {
    if (this.folder) await rm(await this.folder, { recursive: true, force: true });
  }

  /** Where received files lie until they are answered; made at first need. */
  tempFolder(): Promise<string> {
    this.folder ??= mkdtemp(join(tmpdir(), 'lampwright-uploads-'));
    return this.folder;
  }

  private receive(request: Request, response: Response): Promise<void> {
    return new Promise((resolve, reject) => {
      this.read(request, response, (error?: unknown) => {
        if (error) reject(uploadError(error));
        else resolve();
      });
    });
  }
}

function uploadError(error: unknown): unknown {
  if (!(error instanceof MulterError)) {
    // What is left is a malformed or broken-off body; faults of the disk carry a system code.
    if (error instanceof Error && !('syscall' in error))
      return new AppError(
        400,
        'bad-upload',
        'The upload was cut off or malformed; please send the file again.',
      );
    return error;
  }
  switch (error.code) {
    case 'LIMIT_FILE_SIZE':
      return new AppError(
        413,
        'file-too-large',
        `A file may have at most ${MAX_UPLOAD_BYTES / 1024 / 1024} MB. Save the photo smaller, or the PDF with fewer pages.`,
      );
    case 'LIMIT_FILE_COUNT':
    case 'LIMIT_UNEXPECTED_FILE':
      return badInput([{ pointer: `/${FIELD}`, detail: `Send one file, in the field "${FIELD}".` }]);
    default:
      return badInput([{ pointer: error.field ? `/${error.field}` : '', detail: `${error.message}.` }]);
  }
}
