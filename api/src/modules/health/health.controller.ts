import { Controller, Get, Inject, Res } from '@nestjs/common';
import { ApiOkResponse, ApiTags } from '@nestjs/swagger';
import type { Response } from 'express';
import { Public } from '../../access/decorators.js';
import { healthSchema } from './health.dto.js';
import { HealthService } from './health.service.js';

@ApiTags('health')
@Controller('api/health')
export class HealthController {
  constructor(@Inject(HealthService) private readonly health: HealthService) {}

  @Public()
  @Get()
  @ApiOkResponse({ standardSchema: healthSchema })
  async check(@Res({ passthrough: true }) response: Response) {
    const report = await this.health.check();
    response.status(report.status === 'ok' ? 200 : 503).set('Cache-Control', 'no-store');
    return report;
  }
}
