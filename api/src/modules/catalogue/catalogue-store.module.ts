import { Module } from '@nestjs/common';
import { CatalogueRepository } from './catalogue.repository.js';
import { CatalogueService } from './catalogue.service.js';

/** The catalogue without HTTP: for sign-up and the demo too. */
@Module({
  providers: [CatalogueService, CatalogueRepository],
  exports: [CatalogueService, CatalogueRepository],
})
export class CatalogueStoreModule {}
