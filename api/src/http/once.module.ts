import { Module } from '@nestjs/common';
import { APP_INTERCEPTOR } from '@nestjs/core';
import { OnceInterceptor } from './once.interceptor.js';
import { OnceRepository } from './once.repository.js';

/** Has the routes marked `@Once()` happen once. */
@Module({ providers: [OnceRepository, { provide: APP_INTERCEPTOR, useClass: OnceInterceptor }] })
export class OnceModule {}
