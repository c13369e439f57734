import { Module } from '@nestjs/common';
import { CatalogueController } from './catalogue.controller.js';
import { CatalogueStoreModule } from './catalogue-store.module.js';

@Module({
  imports: [CatalogueStoreModule],
  controllers: [CatalogueController],
  exports: [CatalogueStoreModule],
})
export class CatalogueModule {}
