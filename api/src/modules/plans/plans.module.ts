import { Module } from '@nestjs/common';
import { PlanEvents } from './plan-events.js';
import { PlanListener } from './plan-listener.js';
import { PlanStoreModule } from './plan-store.module.js';
import { PlansController } from './plans.controller.js';
import { PlansService } from './plans.service.js';

/** The plan over HTTP. */
@Module({
  imports: [PlanStoreModule],
  controllers: [PlansController],
  providers: [PlansService, PlanEvents, PlanListener],
  exports: [PlansService],
})
export class PlansModule {}
