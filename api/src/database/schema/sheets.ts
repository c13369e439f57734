import {
  doublePrecision,
  foreignKey,
  index,
  integer,
  pgEnum,
  pgTable,
  text,
  uuid,
} from 'drizzle-orm/pg-core';
import { at, createdAt, id } from './columns.js';
import { jobs } from './jobs.js';
import { companies } from './people.js';

export const sheetStatus = pgEnum('sheet_status', [
  'uploaded',
  'processing',
  'choose-page',
  'ready',
  'failed',
]);
export const sheetView = pgEnum('sheet_view', ['photo', 'plan']);

/** A yard photo or plot plan as stored. Its place in the plan is the sheet record with the same id. */
export const sheets = pgTable(
  'sheets',
  {
    id: id(),
    companyId: uuid('company_id')
      .notNull()
      .references(() => companies.id, { onDelete: 'cascade' }),
    jobId: uuid('job_id').notNull(),
    name: text('name').notNull(),
    view: sheetView('view').notNull(),
    status: sheetStatus('status').notNull().default('uploaded'),
    /** A sentence for the user, when it failed. */
    failure: text('failure'),
    /** Pages of the uploaded document, and the one taken. */
    pageCount: integer('page_count'),
    page: integer('page'),
    /** Object keys; the original is gone once the image is made. */
    originalKey: text('original_key'),
    imageKey: text('image_key'),
    thumbnailKey: text('thumbnail_key'),
    imageType: text('image_type'),
    widthPx: integer('width_px'),
    heightPx: integer('height_px'),
    /** Resolution of a raster made from paper. */
    pixelsPerPaperMeter: doublePrecision('pixels_per_paper_meter'),
    uploadedBy: uuid('uploaded_by'),
    createdAt: createdAt(),
    readyAt: at('ready_at'),
    archivedAt: at('archived_at'),
  },
  (t) => [
    foreignKey({
      name: 'sheets_job',
      columns: [t.companyId, t.jobId],
      foreignColumns: [jobs.companyId, jobs.id],
    }).onDelete('cascade'),
    index('sheets_job_index').on(t.companyId, t.jobId),
  ],
);
