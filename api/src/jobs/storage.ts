import { Inject, Injectable } from '@nestjs/common';
import { ObjectStorage } from '../ports/storage/storage.js';
import type { JobHandler } from './job-handler.js';

/** Deletes what a removed sheet, job or company left in object storage. */
@Injectable()
export class DeleteStored implements JobHandler<'storage.delete'> {
  readonly queue = 'storage.delete';

  constructor(@Inject(ObjectStorage) private readonly storage: ObjectStorage) {}

  async handle({ prefix }: { readonly prefix: string }): Promise<void> {
    // An empty prefix would be everything of everybody.
    if (prefix.length < MIN_PREFIX) throw new Error(`Refused to delete by the prefix "${prefix}".`);
    await this.storage.deletePrefix(prefix);
  }
}

/** A company's id and the slash after it. */
const MIN_PREFIX = 37;
