import { fileTypeFromFile } from 'file-type';

export type FileKind = 'image' | 'pdf';

/** Why a file is not taken, in a sentence for the person who chose it. */
export interface FileRefusal {
  readonly code: 'file-empty' | 'file-type' | 'file-heic';
  readonly message: string;
}

const ACCEPTED = 'A sheet is made from a JPEG, PNG or WebP picture, or from a PDF.';

/**
 * What a file is, judged by its bytes: neither its name nor the type that the browser claims is asked.
 * Only its first few kilobytes are read; whether the rest keeps the promise is found out by the decoder.
 */
export async function judgeFile(path: string, size: number): Promise<FileKind | FileRefusal> {
  if (size === 0) return { code: 'file-empty', message: 'This file is empty.' };
  const type = await fileTypeFromFile(path);
  switch (type?.ext) {
    case 'jpg':
    case 'png':
    case 'apng':
    case 'webp':
      return 'image';
    case 'pdf':
      return 'pdf';
    case 'heic':
      return {
        code: 'file-heic',
        message:
          'This is a HEIC photo. Lampwright turns these into JPEG in the browser before they are sent; choose it again on the sheet page, or save it as JPEG first.',
      };
    case undefined:
      return { code: 'file-type', message: `This file could not be recognised. ${ACCEPTED}` };
    default:
      return { code: 'file-type', message: `This is a file of type ${type?.ext}. ${ACCEPTED}` };
  }
}
