import { Module } from '@nestjs/common';
import { EstimatesController } from './estimates.controller.js';
import { EstimatesService } from './estimates.service.js';
import { RequestBudget } from './request-budget.js';

@Module({ controllers: [EstimatesController], providers: [EstimatesService, RequestBudget] })
export class EstimatesModule {}
