import { readFile, rename, writeFile } from 'node:fs/promises';

export interface FakeSession {
  readonly id: string;
  readonly createdAt: number;
  readonly expiresAt: number;
  status: 'open' | 'complete' | 'expired';
  paymentStatus: 'paid' | 'unpaid';
  readonly amount: number;
  readonly currency: string;
  readonly name: string;
  readonly customerEmail: string;
  readonly clientReferenceId: string;
  readonly metadata: Record<string, string>;
  readonly intentMetadata: Record<string, string>;
  intentId: string | null;
  readonly successUrl: string;
  readonly cancelUrl: string;
  /** How often the card with too little money was tried. */
  shortTries: number;
}

export interface FakeIntent {
  readonly id: string;
  readonly createdAt: number;
  readonly amount: number;
  readonly currency: string;
  readonly metadata: Record<string, string>;
  status: 'requires_payment_method' | 'processing' | 'succeeded';
}

export interface FakeRefund {
  readonly id: string;
  readonly createdAt: number;
  readonly intentId: string;
  readonly amount: number;
  readonly currency: string;
  readonly metadata: Record<string, string>;
  status: 'pending' | 'succeeded' | 'failed';
}

/** Something that happens by itself later on. */
export type FakeTimer =
  | { readonly at: number; readonly what: 'bank'; readonly sessionId: string; readonly comes: boolean }
  | { readonly at: number; readonly what: 'refund'; readonly refundId: string; readonly comes: boolean };

/** Word that is still to be brought to the product. */
export interface FakeDelivery {
  readonly id: string;
  readonly payload: string;
  dueAt: number;
  tries: number;
}

export interface KeptAnswer {
  readonly fingerprint: string;
  readonly status: number;
  readonly body: unknown;
  readonly at: number;
}

export interface FakeState {
  sessions: Record<string, FakeSession>;
  intents: Record<string, FakeIntent>;
  refunds: Record<string, FakeRefund>;
  timers: FakeTimer[];
  deliveries: FakeDelivery[];
  answers: Record<string, KeptAnswer>;
}

const empty = (): FakeState => ({
  sessions: {},
  intents: {},
  refunds: {},
  timers: [],
  deliveries: [],
  answers: {},
});

/** Keeps the state in a file, so that stopping and starting loses nothing. */
export class StateFile {
  private saving: Promise<void> = Promise.resolve();

  private constructor(
    private readonly file: string,
    readonly state: FakeState,
  ) {}

  static async open(file: string): Promise<StateFile> {
    const text = await readFile(file, 'utf8').catch((error: NodeJS.ErrnoException) => {
      if (error.code === 'ENOENT') return null;
      throw error;
    });
    return new StateFile(file, text === null ? empty() : { ...empty(), ...JSON.parse(text) });
  }

  /** Resolves when everything up to now is in the file. */
  async save(): Promise<void> {
    this.saving = this.saving.then(async () => {
      await writeFile(`${this.file}.new`, JSON.stringify(this.state), { mode: 0o600 });
      await rename(`${this.file}.new`, this.file);
    });
    await this.saving;
  }
}
