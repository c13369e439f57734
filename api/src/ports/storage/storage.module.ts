import { Global, Module } from '@nestjs/common';
import { ENV } from '../../config/config.module.js';
import type { Env } from '../../config/env.js';
import { S3Storage } from './s3-storage.js';
import { ObjectStorage } from './storage.js';

@Global()
@Module({
  providers: [{ provide: ObjectStorage, inject: [ENV], useFactory: (env: Env) => new S3Storage(env) }],
  exports: [ObjectStorage],
})
export class StorageModule {}
