import { Module } from '@nestjs/common';
import { ShareController } from './share.controller.js';
import { ShareService } from './share.service.js';

/** What a homeowner sees and does by a link. */
@Module({
  controllers: [ShareController],
  providers: [ShareService],
})
export class ShareModule {}
