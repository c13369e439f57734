import { Module } from '@nestjs/common';
import { DevMailController } from './dev-mail.controller.js';
import { DevMailService } from './dev-mail.service.js';

/** Part of the application in local mode only. */
@Module({ controllers: [DevMailController], providers: [DevMailService] })
export class DevMailModule {}
