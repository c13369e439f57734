import { useMutation } from '@tanstack/react-query';
import { useRef } from 'react';
import { ApiProblem } from './api/client';

/** Tells the server that two requests are one intention. */
export type OnceHeaders = { readonly 'Idempotency-Key': string };

/**
 * The key of an intended action: the same while the same thing is tried again, another one once it happened,
 * was refused, or something else is wanted.
 */
export class OnceKey {
  private held: { readonly intent: string; readonly key: string } | null = null;

  constructor(private readonly make: () => string = () => crypto.randomUUID()) {}

  headersFor(intent: unknown): OnceHeaders {
    const written = JSON.stringify(intent) ?? '';
    if (this.held?.intent !== written) this.held = { intent: written, key: this.make() };
    return { 'Idempotency-Key': this.held.key };
  }

  /** The action is over with: what comes next is a new one. */
  done(): void {
    this.held = null;
  }

  /** After a failure: a request that the server may have carried out, or is at, keeps its key. */
  failed(error: unknown): void {
    if (error instanceof ApiProblem && wasRefused(error)) this.done();
  }
}

const wasRefused = ({ status, code }: ApiProblem): boolean =>
  status >= 400 && status < 500 && status !== 408 && status !== 429 && code !== 'in-flight';

/** A mutation about money or mail, which happens once however often its button is pressed. */
export function useOnce<In, Out>(
  act: (input: In, headers: OnceHeaders) => Promise<Out>,
  onSuccess: (out: Out) => unknown,
) {
  const key = useRef<OnceKey>(null);
  key.current ??= new OnceKey();
  const once = key.current;
  return useMutation({
    mutationFn: (input: In) => act(input, once.headersFor(input)),
    onSuccess: (out) => {
      once.done();
      return onSuccess(out);
    },
    onError: (error) => once.failed(error),
  });
}
