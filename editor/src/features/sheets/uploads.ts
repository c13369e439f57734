import { useCallback, useEffect, useRef, useState } from 'react';
import { ApiProblem, isAbort, sentenceOf } from '../../lib/api/client';
import { upload } from '../../lib/api/upload';
import type { SheetView } from '../../lib/sheets';
import { isHeic, jpegFromHeic } from './heic';

/** The server's limit, known here so that nobody uploads 100 MB to be told. */
export const MOST_BYTES = 40 * 1024 * 1024;

export type UploadStep =
  | { readonly kind: 'decoding' }
  | { readonly kind: 'sending'; readonly share: number }
  | {
      readonly kind: 'failed';
      readonly sentence: string;
      /** A file that was refused will be refused again. */
      readonly canRetry: boolean;
    };

/** A file on its way; once the server has it, it is one of the job's sheets. */
export interface Upload {
  readonly id: number;
  readonly file: File;
  readonly view: SheetView;
  readonly step: UploadStep;
}

/** "Patio from the north" of "Patio from the north.jpeg". */
export function nameOfFile(fileName: string, view: SheetView): string {
  const bare = fileName.replace(/\.[^.]*$/, '').trim();
  return bare.slice(0, 120) || (view === 'photo' ? 'Yard photo' : 'Plot plan');
}

const tooLarge = (file: File) =>
  new ApiProblem(
    413,
    'too-large',
    `${file.name} has ${Math.ceil(file.size / 1024 / 1024)} MB; a sheet may have 40 MB at most.`,
  );

const isRefusal = (error: unknown): boolean =>
  error instanceof ApiProblem && (error.status === 413 || error.status === 415);

/** Decodes where needed and sends one file. */
async function sendOne(
  jobId: string,
  { file, view }: Upload,
  signal: AbortSignal,
  tell: (step: UploadStep) => void,
): Promise<void> {
  let image = file;
  if (await isHeic(file)) {
    tell({ kind: 'decoding' });
    try {
      image = await jpegFromHeic(file);
    } catch {
      throw new ApiProblem(
        415,
        'heic-undecodable',
        `${file.name} could not be decoded in this browser. Save it as JPEG and choose that.`,
      );
    }
    signal.throwIfAborted();
  }
  if (image.size > MOST_BYTES) throw tooLarge(image);
  const form = new FormData();
  form.set('view', view);
  form.set('name', nameOfFile(file.name, view));
  form.set('file', image);
  tell({ kind: 'sending', share: 0 });
  await upload(`/api/jobs/${encodeURIComponent(jobId)}/sheets`, form, {
    signal,
    onProgress: (share) => tell({ kind: 'sending', share }),
  });
}

/** The uploads of one job's page: begun together, cancelled or tried again one by one. */
export function useUploads(jobId: string, onReceived: () => void) {
  const [uploads, setUploads] = useState<readonly Upload[]>([]);
  const controllers = useRef(new Map<number, AbortController>());
  const nextId = useRef(1);
  const received = useRef(onReceived);
  received.current = onReceived;

  const drop = useCallback((id: number) => {
    controllers.current.delete(id);
    setUploads((now) => now.filter((upload) => upload.id !== id));
  }, []);

  const run = useCallback(
    async (one: Upload) => {
      const controller = new AbortController();
      controllers.current.set(one.id, controller);
      const tell = (step: UploadStep) =>
        setUploads((now) => now.map((upload) => (upload.id === one.id ? { ...upload, step } : upload)));
      try {
        await sendOne(jobId, one, controller.signal, tell);
        received.current();
        drop(one.id);
      } catch (error) {
        if (isAbort(error)) drop(one.id);
        else tell({ kind: 'failed', sentence: sentenceOf(error), canRetry: !isRefusal(error) });
      }
    },
    [jobId, drop],
  );

  const add = useCallback(
    (files: readonly File[], view: SheetView) => {
      const added = files.map(
        (file): Upload => ({ id: nextId.current++, file, view, step: { kind: 'sending', share: 0 } }),
      );
      setUploads((now) => [...now, ...added]);
      for (const one of added) void run(one);
    },
    [run],
  );

  const cancel = useCallback(
    (id: number) => {
      controllers.current.get(id)?.abort();
      drop(id);
    },
    [drop],
  );

  const busy = uploads.some((upload) => upload.step.kind !== 'failed');
  // Leaving the page would cut the upload off: the browser asks first.
  useEffect(() => {
    if (!busy) return;
    const ask = (event: BeforeUnloadEvent) => event.preventDefault();
    window.addEventListener('beforeunload', ask);
    return () => window.removeEventListener('beforeunload', ask);
  }, [busy]);

  return { uploads, add, cancel, retry: run };
}
