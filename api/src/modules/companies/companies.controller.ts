import { pipeline } from 'node:stream/promises';
import { Body, Controller, Delete, Get, HttpCode, Inject, Patch, Post, Req, Res } from '@nestjs/common';
import { ApiNoContentResponse, ApiOkResponse, ApiProduces, ApiTags } from '@nestjs/swagger';
import type { Request, Response } from 'express';
import type { Actor } from '../../access/actor.js';
import { CurrentActor, Permit } from '../../access/decorators.js';
import {
  type Company,
  type CompanyDeletion,
  type CompanyEdit,
  companyDeletionSchema,
  companyEditSchema,
  companySchema,
} from './companies.dto.js';
import { CompaniesService } from './companies.service.js';
import { ExportService } from './export.service.js';

@ApiTags('company')
@Controller('api/company')
export class CompaniesController {
  constructor(
    @Inject(CompaniesService) private readonly companies: CompaniesService,
    @Inject(ExportService) private readonly exports: ExportService,
  ) {}

  @Get()
  @Permit('company.read')
  @ApiOkResponse({ standardSchema: companySchema })
  get(@CurrentActor() actor: Actor): Promise<Company> {
    return this.companies.get(actor);
  }

  @Patch()
  @Permit('company.edit')
  @ApiOkResponse({ standardSchema: companySchema })
  edit(
    @CurrentActor() actor: Actor,
    @Body({ schema: companyEditSchema }) edit: CompanyEdit,
  ): Promise<Company> {
    return this.companies.edit(actor, edit);
  }

  @Post('export')
  @Permit('company.export')
  @HttpCode(200)
  @ApiProduces('application/gzip')
  @ApiOkResponse({ schema: { type: 'string', format: 'binary' } })
  async export(@CurrentActor() actor: Actor, @Res() response: Response): Promise<void> {
    const { fileName, stream } = await this.exports.export(actor);
    response
      .set('Content-Type', 'application/gzip')
      .set('Content-Disposition', `attachment; filename="${fileName}"`)
      .set('Cache-Control', 'no-store');
    // A reader who leaves, or a file that fails midway, cuts the answer off; there is nothing left to say then.
    await pipeline(stream, response).catch(() => response.destroy());
  }

  @Delete()
  @Permit('company.delete')
  @HttpCode(204)
  @ApiNoContentResponse()
  async delete(
    @CurrentActor() actor: Actor,
    @Req() request: Request,
    @Body({ schema: companyDeletionSchema }) deletion: CompanyDeletion,
  ): Promise<void> {
    await this.companies.delete(actor, request.ip ?? '', deletion);
  }
}
