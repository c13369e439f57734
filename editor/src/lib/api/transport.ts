import { problemFrom, unreachable } from './problem';

type Listener = () => void;

const signedOutListeners = new Set<Listener>();

/** Called whenever the server says that nobody is signed in, so that the app can ask for it. Returns its own undoing. */
export function onSignedOut(listener: Listener): () => void {
  signedOutListeners.add(listener);
  return () => signedOutListeners.delete(listener);
}

/** The problem that an answer tells of; a missing session is told to the listeners on the way. */
export function problemOf(status: number, body: unknown) {
  const problem = problemFrom(status, body);
  // A wrong password also answers 401, but only a missing session says so by this code.
  if (problem.status === 401 && problem.code === 'not-signed-in')
    for (const listener of signedOutListeners) listener();
  return problem;
}

/** JSON of a text, or null where there is none. */
export function jsonOrNull(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    return null;
  }
}

/**
 * Every call leaves through here, so that errors are of one kind.
 * @throws ApiProblem for every answer that is no success, and when no answer came (status 0);
 *   DOMException AbortError when the signal aborts it.
 */
export async function fetchOrProblem(request: Request): Promise<Response> {
  let response: Response;
  try {
    response = await fetch(request);
  } catch (error) {
    // fetch rejects with TypeError when the network fails; an abort passes through as it is.
    if (error instanceof TypeError) throw unreachable();
    throw error;
  }
  if (response.ok) return response;
  throw problemOf(response.status, jsonOrNull(await response.text()));
}
