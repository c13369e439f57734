import { unreachable } from './problem';
import { jsonOrNull, problemOf } from './transport';

interface UploadOptions {
  /** Share of the bytes that have left, 0 to 1. */
  readonly onProgress: (share: number) => void;
  readonly signal: AbortSignal;
}

/**
 * Sends a form with a file, and gives the answer's JSON unparsed. XMLHttpRequest, because fetch cannot tell
 * how much of a body has left.
 * @throws ApiProblem as `send` does; DOMException AbortError when the signal aborts it.
 */
export function upload(
  path: string,
  form: FormData,
  { onProgress, signal }: UploadOptions,
): Promise<unknown> {
  return new Promise((resolve, reject) => {
    const request = new XMLHttpRequest();
    const aborted = () => reject(new DOMException('The upload was cancelled.', 'AbortError'));
    const abort = () => request.abort();
    if (signal.aborted) return aborted();
    signal.addEventListener('abort', abort, { once: true });
    request.onloadend = () => signal.removeEventListener('abort', abort);
    request.onabort = aborted;
    request.onerror = () => reject(unreachable());
    request.upload.onprogress = (event) => {
      if (event.lengthComputable) onProgress(event.loaded / event.total);
    };
    request.onload = () => {
      const body = jsonOrNull(request.responseText);
      if (request.status >= 200 && request.status < 300) return resolve(body);
      reject(problemOf(request.status, body));
    };
    request.open('POST', path);
    request.setRequestHeader('Accept', 'application/json');
    request.send(form);
  });
}
