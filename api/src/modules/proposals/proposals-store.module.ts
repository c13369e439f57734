import { Module } from '@nestjs/common';
import { NumberingModule } from '../numbering/numbering.module.js';
import { PlanStoreModule } from '../plans/plan-store.module.js';
import { PricingStoreModule } from '../pricing/pricing-store.module.js';
import { TimelineStoreModule } from '../timeline/timeline-store.module.js';
import { CompanyTexts } from './company-texts.js';
import { ProposalLinks } from './links.js';
import { NightPictures } from './night-pictures.js';
import { PartiesRepository } from './parties.repository.js';
import { ProposalStore } from './proposal-store.js';
import { ProposalTextsRepository } from './proposal-texts.repository.js';
import { ProposalsRepository } from './proposals.repository.js';
import { Seal } from './seal.js';
import { Sending } from './sending.js';
import { RevisionViews } from './views.js';

const shared = [
  CompanyTexts,
  NightPictures,
  PartiesRepository,
  ProposalLinks,
  ProposalsRepository,
  ProposalStore,
  RevisionViews,
  Sending,
];

/** Proposals without HTTP: for the homeowner's page, payments and the worker. */
@Module({
  imports: [TimelineStoreModule, PlanStoreModule, PricingStoreModule, NumberingModule],
  providers: [...shared, ProposalTextsRepository, Seal],
  exports: [...shared, PlanStoreModule, PricingStoreModule, NumberingModule, TimelineStoreModule],
})
export class ProposalsStoreModule {}
