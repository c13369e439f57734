import { Module } from '@nestjs/common';
import { Decoder } from '../../media/decoder.js';
import { CatalogueStoreModule } from '../catalogue/catalogue-store.module.js';
import { PricingStoreModule } from '../pricing/pricing-store.module.js';
import { CatalogueExportService } from './catalogue-export.service.js';
import { CatalogueImportController } from './catalogue-import.controller.js';
import { CatalogueImportService } from './catalogue-import.service.js';
import { CatalogueImportsRepository } from './catalogue-imports.repository.js';

/** Tables of items and prices, into the catalogue and out of it. */
@Module({
  imports: [CatalogueStoreModule, PricingStoreModule],
  controllers: [CatalogueImportController],
  providers: [CatalogueImportService, CatalogueExportService, CatalogueImportsRepository, Decoder],
})
export class CatalogueImportModule {}
