import type { TestPerson } from '../people.js';
import type { World } from './world.js';

/**
 * Who may use a route, said here once more and independently of the permission table:
 * - anyone: signed in or not
 * - signed-in: whatever their company, or none
 * - everyone: each role of a company · planners: owner and designer · owners
 * - link: whoever holds the live link that the route names as `linkId`, and nobody else
 */
export type Audience = 'anyone' | 'signed-in' | 'everyone' | 'planners' | 'owners' | 'link';

/** A request that succeeds for those who may make it. */
export interface ValidRequest {
  /** Values of the route's parameters. */
  readonly params?: Readonly<Record<string, string>>;
  readonly query?: Readonly<Record<string, string>>;
  readonly body?: object;
  /** An uploaded file, sent with the fields as a form. */
  readonly file?: { readonly name: string; readonly content: Buffer };
  readonly fields?: Readonly<Record<string, string>>;
  /** Beside the Idempotency-Key, which every request carries. */
  readonly headers?: Readonly<Record<string, string>>;
}

export interface RouteCase {
  /** Method and path as the server has them: "PATCH /api/jobs/:id". */
  readonly route: string;
  readonly audience: Audience;
  /**
   * What the owner of another company gets for the same request: "hidden" (404) where it names something of
   * ours, "own" where it can only be about themselves or their own company. Routes with parameters are hidden
   * unless they say otherwise.
   */
  readonly elsewhere?: 'hidden' | 'own';
  /** The status of a call by those who may; any of 200 to 299 by default. */
  readonly answers?: number;
  /** The answer goes on until its reader leaves (a stream of events): only its beginning is looked at. */
  readonly endless?: true;
  /**
   * Makes whatever the request is about, in a world that is made for this one call. Without a caller the
   * request is about the company's things; `caller` is for what belongs to a person.
   */
  readonly request?: (world: World, caller: TestPerson | null) => ValidRequest | Promise<ValidRequest>;
}

export const hiddenElsewhere = ({ route, elsewhere }: RouteCase): boolean =>
  (elsewhere ?? (route.includes(':') ? 'hidden' : 'own')) === 'hidden';
