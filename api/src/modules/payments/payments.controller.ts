import { Body, Controller, Get, HttpCode, Inject, Param, Post, Query, Req, Res } from '@nestjs/common';
import { ApiCreatedResponse, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import type { Request, Response } from 'express';
import { z } from 'zod';
import type { Actor } from '../../access/actor.js';
import { CurrentActor, Permit } from '../../access/decorators.js';
import { Once } from '../../http/once.js';
import { sendFile } from '../../http/send-file.js';
import {
  type JobPayments,
  jobPaymentsSchema,
  type NewRefund,
  newRefundSchema,
  type PaymentsExportQuery,
  paymentsExportQuerySchema,
  type RecordPayment,
  recordPaymentSchema,
} from './payments.dto.js';
import { PaymentsService } from './payments.service.js';

const id = { schema: z.uuid() };
const file = { description: 'The file.', schema: { type: 'string', format: 'binary' } };

@ApiTags('payments')
@Controller('api')
export class PaymentsController {
  constructor(@Inject(PaymentsService) private readonly payments: PaymentsService) {}

  @Get('jobs/:jobId/payments')
  @Permit('payments.read')
  @ApiOkResponse({ standardSchema: jobPaymentsSchema })
  ofJob(@CurrentActor() actor: Actor, @Param('jobId', id) jobId: string): Promise<JobPayments> {
    return this.payments.ofJob(actor, jobId);
  }

  @Post('jobs/:jobId/dues/:dueId/request')
  @HttpCode(200)
  @Permit('payments.record')
  @Once()
  @ApiOkResponse({ standardSchema: jobPaymentsSchema })
  request(
    @CurrentActor() actor: Actor,
    @Param('jobId', id) jobId: string,
    @Param('dueId', id) dueId: string,
  ): Promise<JobPayments> {
    return this.payments.request(actor, jobId, dueId);
  }

  @Post('jobs/:jobId/dues/:dueId/payments')
  @Permit('payments.record')
  @Once()
  @ApiCreatedResponse({ standardSchema: jobPaymentsSchema })
  record(
    @CurrentActor() actor: Actor,
    @Param('jobId', id) jobId: string,
    @Param('dueId', id) dueId: string,
    @Body({ schema: recordPaymentSchema }) input: RecordPayment,
  ): Promise<JobPayments> {
    return this.payments.record(actor, jobId, dueId, input);
  }

  @Post('jobs/:jobId/payments/:paymentId/refunds')
  @Permit('payments.refund')
  @Once()
  @ApiCreatedResponse({ standardSchema: jobPaymentsSchema })
  refund(
    @CurrentActor() actor: Actor,
    @Param('jobId', id) jobId: string,
    @Param('paymentId', id) paymentId: string,
    @Body({ schema: newRefundSchema }) input: NewRefund,
  ): Promise<JobPayments> {
    return this.payments.refund(actor, jobId, paymentId, input);
  }

  @Get('jobs/:jobId/money-documents/:documentId/pdf')
  @Permit('payments.read')
  @ApiOkResponse(file)
  async documentPdf(
    @CurrentActor() actor: Actor,
    @Param('jobId', id) jobId: string,
    @Param('documentId', id) documentId: string,
    @Req() request: Request,
    @Res() response: Response,
  ): Promise<void> {
    await sendFile(await this.payments.documentPdf(actor, jobId, documentId), request, response);
  }

  @Get('payments/export')
  @Permit('payments.export')
  @ApiOkResponse({
    description: 'Invoices, receipts and refunds as CSV.',
    content: { 'text/csv': { schema: { type: 'string' } } },
  })
  async export(
    @CurrentActor() actor: Actor,
    @Query({ schema: paymentsExportQuerySchema }) query: PaymentsExportQuery,
    @Res() response: Response,
  ): Promise<void> {
    const csv = await this.payments.export(actor, query);
    response
      .set({
        'Content-Type': 'text/csv; charset=utf-8; header=present',
        'Content-Disposition': 'attachment; filename="payments.csv"',
        'X-Content-Type-Options': 'nosniff',
      })
      .send(csv);
  }
}
