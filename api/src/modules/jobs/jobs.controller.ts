import { Body, Controller, Get, HttpCode, Inject, Param, Patch, Post, Put, Query } from '@nestjs/common';
import { ApiCreatedResponse, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { z } from 'zod';
import type { Actor } from '../../access/actor.js';
import { CurrentActor, Permit } from '../../access/decorators.js';
import {
  type Job,
  type JobEdit,
  type JobList,
  type JobListQuery,
  jobEditSchema,
  jobListQuerySchema,
  jobListSchema,
  jobSchema,
  type NewJob,
  newJobSchema,
} from './jobs.dto.js';
import { JobsService } from './jobs.service.js';
import { type SiteWalk, siteWalkSchema } from './site-walk.dto.js';

const id = { schema: z.uuid() };

@ApiTags('jobs')
@Controller('api/jobs')
export class JobsController {
  constructor(@Inject(JobsService) private readonly jobs: JobsService) {}

  @Get()
  @Permit('jobs.read')
  @ApiOkResponse({ standardSchema: jobListSchema })
  list(
    @CurrentActor() actor: Actor,
    @Query({ schema: jobListQuerySchema }) query: JobListQuery,
  ): Promise<JobList> {
    return this.jobs.list(actor, query);
  }

  @Post()
  @Permit('jobs.edit')
  @ApiCreatedResponse({ standardSchema: jobSchema })
  create(@CurrentActor() actor: Actor, @Body({ schema: newJobSchema }) input: NewJob): Promise<Job> {
    return this.jobs.create(actor, input);
  }

  @Get(':id')
  @Permit('jobs.read')
  @ApiOkResponse({ standardSchema: jobSchema })
  get(@CurrentActor() actor: Actor, @Param('id', id) jobId: string): Promise<Job> {
    return this.jobs.get(actor, jobId);
  }

  @Patch(':id')
  @Permit('jobs.edit')
  @ApiOkResponse({ standardSchema: jobSchema })
  edit(
    @CurrentActor() actor: Actor,
    @Param('id', id) jobId: string,
    @Body({ schema: jobEditSchema }) edit: JobEdit,
  ): Promise<Job> {
    return this.jobs.edit(actor, jobId, edit);
  }

  @Put(':id/site-walk')
  @Permit('jobs.survey')
  @ApiOkResponse({ standardSchema: jobSchema })
  saveSiteWalk(
    @CurrentActor() actor: Actor,
    @Param('id', id) jobId: string,
    @Body({ schema: siteWalkSchema }) siteWalk: SiteWalk,
  ): Promise<Job> {
    return this.jobs.saveSiteWalk(actor, jobId, siteWalk);
  }

  @Post(':id/archive')
  @HttpCode(200)
  @Permit('jobs.edit')
  @ApiOkResponse({ standardSchema: jobSchema })
  archive(@CurrentActor() actor: Actor, @Param('id', id) jobId: string): Promise<Job> {
    return this.jobs.archive(actor, jobId);
  }

  @Post(':id/restore')
  @HttpCode(200)
  @Permit('jobs.edit')
  @ApiOkResponse({ standardSchema: jobSchema })
  restore(@CurrentActor() actor: Actor, @Param('id', id) jobId: string): Promise<Job> {
    return this.jobs.restore(actor, jobId);
  }
}
