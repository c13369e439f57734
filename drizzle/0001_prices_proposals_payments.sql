CREATE TYPE "public"."due_when" AS ENUM('approval', 'start', 'finish');--> statement-breakpoint
CREATE TYPE "public"."money_document_kind" AS ENUM('invoice', 'receipt', 'refund');--> statement-breakpoint
CREATE TYPE "public"."payment_method" AS ENUM('card', 'cheque', 'transfer', 'cash');--> statement-breakpoint
CREATE TYPE "public"."payment_status" AS ENUM('open', 'succeeded', 'failed', 'expired');--> statement-breakpoint
CREATE TYPE "public"."refund_status" AS ENUM('pending', 'succeeded', 'failed');--> statement-breakpoint
CREATE TYPE "public"."message_side" AS ENUM('homeowner', 'company');--> statement-breakpoint
CREATE TYPE "public"."paper_status" AS ENUM('preparing', 'ready', 'failed');--> statement-breakpoint
CREATE TABLE "dues" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"company_id" uuid NOT NULL,
	"proposal_id" uuid NOT NULL,
	"approval_id" uuid NOT NULL,
	"name" text NOT NULL,
	"due" "due_when" NOT NULL,
	"position" integer NOT NULL,
	"amount_minor" bigint NOT NULL,
	"reduced_minor" bigint DEFAULT 0 NOT NULL,
	"currency" text NOT NULL,
	"requested_at" timestamp with time zone,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "dues_company_id" UNIQUE("company_id","id"),
	CONSTRAINT "dues_of_approval" UNIQUE("company_id","approval_id","position")
);
--> statement-breakpoint
CREATE TABLE "money_documents" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"company_id" uuid NOT NULL,
	"proposal_id" uuid NOT NULL,
	"kind" "money_document_kind" NOT NULL,
	"number" integer NOT NULL,
	"due_id" uuid,
	"payment_id" uuid,
	"refund_id" uuid,
	"amount_minor" bigint NOT NULL,
	"currency" text NOT NULL,
	"document" jsonb NOT NULL,
	"status" "paper_status" DEFAULT 'preparing' NOT NULL,
	"pdf_key" text,
	"pdf_hash" text,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"mailed_at" timestamp with time zone,
	CONSTRAINT "money_documents_number" UNIQUE("company_id","kind","number"),
	CONSTRAINT "money_documents_company_id" UNIQUE("company_id","id")
);
--> statement-breakpoint
CREATE TABLE "payment_events" (
	"event_id" text PRIMARY KEY NOT NULL,
	"type" text NOT NULL,
	"received_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "payments" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"company_id" uuid NOT NULL,
	"proposal_id" uuid NOT NULL,
	"due_id" uuid NOT NULL,
	"method" "payment_method" NOT NULL,
	"status" "payment_status" NOT NULL,
	"amount_minor" bigint NOT NULL,
	"currency" text NOT NULL,
	"checkout_id" text,
	"checkout_url" text,
	"payment_intent_id" text,
	"received_on" date,
	"note" text DEFAULT '' NOT NULL,
	"recorded_by" uuid,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"settled_at" timestamp with time zone,
	CONSTRAINT "payments_company_id" UNIQUE("company_id","id")
);
--> statement-breakpoint
CREATE TABLE "refunds" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"company_id" uuid NOT NULL,
	"payment_id" uuid NOT NULL,
	"amount_minor" bigint NOT NULL,
	"reason" text NOT NULL,
	"status" "refund_status" NOT NULL,
	"provider_id" text,
	"created_by" uuid,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"settled_at" timestamp with time zone,
	CONSTRAINT "refunds_company_id" UNIQUE("company_id","id")
);
--> statement-breakpoint
CREATE TABLE "catalogue_imports" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"company_id" uuid NOT NULL,
	"file_name" text NOT NULL,
	"summary" jsonb NOT NULL,
	"undo" jsonb NOT NULL,
	"created_by" uuid,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"undone_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "catalogue_prices" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"company_id" uuid NOT NULL,
	"item_id" uuid NOT NULL,
	"price" jsonb NOT NULL,
	"import_id" uuid,
	"created_by" uuid,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "company_counters" (
	"company_id" uuid NOT NULL,
	"name" text NOT NULL,
	"last" integer NOT NULL,
	CONSTRAINT "company_counters_company_id_name_pk" PRIMARY KEY("company_id","name")
);
--> statement-breakpoint
CREATE TABLE "fault_acceptances" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"company_id" uuid NOT NULL,
	"job_id" uuid NOT NULL,
	"fault_key" text NOT NULL,
	"message" text NOT NULL,
	"reason" text NOT NULL,
	"accepted_by" uuid,
	"accepted_by_name" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"withdrawn_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "idempotency_keys" (
	"scope" text NOT NULL,
	"key" text NOT NULL,
	"route" text NOT NULL,
	"body_hash" text NOT NULL,
	"status" integer,
	"answer" jsonb,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "idempotency_keys_scope_key_pk" PRIMARY KEY("scope","key")
);
--> statement-breakpoint
CREATE TABLE "job_events" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"company_id" uuid NOT NULL,
	"job_id" uuid NOT NULL,
	"kind" text NOT NULL,
	"actor_id" uuid,
	"actor_name" text DEFAULT '' NOT NULL,
	"data" jsonb DEFAULT '{}'::jsonb NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "job_pricings" (
	"company_id" uuid NOT NULL,
	"job_id" uuid NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"pricing" jsonb NOT NULL,
	"updated_by" uuid,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "job_pricings_company_id_job_id_pk" PRIMARY KEY("company_id","job_id")
);
--> statement-breakpoint
CREATE TABLE "price_books" (
	"company_id" uuid PRIMARY KEY NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"book" jsonb NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "approvals" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"company_id" uuid NOT NULL,
	"proposal_id" uuid NOT NULL,
	"revision_id" uuid NOT NULL,
	"link_id" uuid NOT NULL,
	"groups" jsonb NOT NULL,
	"total_minor" bigint NOT NULL,
	"typed_name" text NOT NULL,
	"agreed_to" text NOT NULL,
	"consented_to" text NOT NULL,
	"address" text NOT NULL,
	"user_agent" text NOT NULL,
	"revision_hash" text NOT NULL,
	"pdf_hash" text NOT NULL,
	"approved_at" timestamp with time zone DEFAULT now() NOT NULL,
	"status" "paper_status" DEFAULT 'preparing' NOT NULL,
	"signed_pdf_key" text,
	"signed_pdf_hash" text,
	CONSTRAINT "approvals_revision" UNIQUE("company_id","revision_id"),
	CONSTRAINT "approvals_company_id" UNIQUE("company_id","id")
);
--> statement-breakpoint
CREATE TABLE "declines" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"company_id" uuid NOT NULL,
	"proposal_id" uuid NOT NULL,
	"revision_id" uuid NOT NULL,
	"link_id" uuid NOT NULL,
	"reason" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "declines_revision" UNIQUE("company_id","revision_id")
);
--> statement-breakpoint
CREATE TABLE "proposal_links" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"company_id" uuid NOT NULL,
	"proposal_id" uuid NOT NULL,
	"token_hash" text NOT NULL,
	"sealed_token" text NOT NULL,
	"name" text DEFAULT '' NOT NULL,
	"email" text NOT NULL,
	"created_by" uuid,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"revoked_at" timestamp with time zone,
	"opened_at" timestamp with time zone,
	"last_seen_at" timestamp with time zone,
	"reminders_sent" integer DEFAULT 0 NOT NULL,
	"last_mail_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "proposal_links_token_hash_unique" UNIQUE("token_hash"),
	CONSTRAINT "proposal_links_company_id" UNIQUE("company_id","id")
);
--> statement-breakpoint
CREATE TABLE "proposal_revisions" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"company_id" uuid NOT NULL,
	"proposal_id" uuid NOT NULL,
	"revision" integer NOT NULL,
	"plan_version" integer NOT NULL,
	"document" text NOT NULL,
	"hash" text NOT NULL,
	"changes_revision_id" uuid,
	"total_minor" bigint NOT NULL,
	"cost_minor" bigint,
	"status" "paper_status" DEFAULT 'preparing' NOT NULL,
	"progress" integer DEFAULT 0 NOT NULL,
	"failure" text,
	"pdf_key" text,
	"pdf_hash" text,
	"pictures" jsonb DEFAULT '{}'::jsonb NOT NULL,
	"valid_until" timestamp with time zone NOT NULL,
	"send_to" jsonb,
	"sent_at" timestamp with time zone,
	"withdrawn_at" timestamp with time zone,
	"released_at" timestamp with time zone,
	"released_by" uuid,
	"created_by" uuid,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "proposal_revisions_number" UNIQUE("company_id","proposal_id","revision"),
	CONSTRAINT "proposal_revisions_company_id" UNIQUE("company_id","id")
);
--> statement-breakpoint
CREATE TABLE "proposal_texts" (
	"company_id" uuid PRIMARY KEY NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"texts" jsonb NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "proposals" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"company_id" uuid NOT NULL,
	"job_id" uuid NOT NULL,
	"number" integer NOT NULL,
	"texts" jsonb DEFAULT '{}'::jsonb NOT NULL,
	"created_by" uuid,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "proposals_company_id" UNIQUE("company_id","id"),
	CONSTRAINT "proposals_number" UNIQUE("company_id","number"),
	CONSTRAINT "proposals_job" UNIQUE("company_id","job_id")
);
--> statement-breakpoint
CREATE TABLE "question_messages" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"company_id" uuid NOT NULL,
	"question_id" uuid NOT NULL,
	"side" "message_side" NOT NULL,
	"author_id" uuid,
	"author_name" text NOT NULL,
	"text" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "questions" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"company_id" uuid NOT NULL,
	"proposal_id" uuid NOT NULL,
	"revision_id" uuid NOT NULL,
	"record_id" text,
	"sheet_id" text,
	"x" double precision,
	"y" double precision,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"resolved_at" timestamp with time zone,
	CONSTRAINT "questions_company_id" UNIQUE("company_id","id")
);
--> statement-breakpoint
ALTER TABLE "mail_messages" ADD COLUMN "attachments" jsonb DEFAULT '[]'::jsonb NOT NULL;--> statement-breakpoint
ALTER TABLE "mail_messages" ADD COLUMN "reply_to" text;--> statement-breakpoint
ALTER TABLE "dues" ADD CONSTRAINT "dues_company_id_companies_id_fk" FOREIGN KEY ("company_id") REFERENCES "public"."companies"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "dues" ADD CONSTRAINT "dues_proposal" FOREIGN KEY ("company_id","proposal_id") REFERENCES "public"."proposals"("company_id","id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "dues" ADD CONSTRAINT "dues_approval" FOREIGN KEY ("company_id","approval_id") REFERENCES "public"."approvals"("company_id","id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "money_documents" ADD CONSTRAINT "money_documents_company_id_companies_id_fk" FOREIGN KEY ("company_id") REFERENCES "public"."companies"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "money_documents" ADD CONSTRAINT "money_documents_proposal" FOREIGN KEY ("company_id","proposal_id") REFERENCES "public"."proposals"("company_id","id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "payments" ADD CONSTRAINT "payments_company_id_companies_id_fk" FOREIGN KEY ("company_id") REFERENCES "public"."companies"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "payments" ADD CONSTRAINT "payments_due" FOREIGN KEY ("company_id","due_id") REFERENCES "public"."dues"("company_id","id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "refunds" ADD CONSTRAINT "refunds_company_id_companies_id_fk" FOREIGN KEY ("company_id") REFERENCES "public"."companies"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "refunds" ADD CONSTRAINT "refunds_payment" FOREIGN KEY ("company_id","payment_id") REFERENCES "public"."payments"("company_id","id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "catalogue_imports" ADD CONSTRAINT "catalogue_imports_company_id_companies_id_fk" FOREIGN KEY ("company_id") REFERENCES "public"."companies"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "catalogue_prices" ADD CONSTRAINT "catalogue_prices_company_id_companies_id_fk" FOREIGN KEY ("company_id") REFERENCES "public"."companies"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "catalogue_prices" ADD CONSTRAINT "catalogue_prices_item_id_catalogue_items_id_fk" FOREIGN KEY ("item_id") REFERENCES "public"."catalogue_items"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "company_counters" ADD CONSTRAINT "company_counters_company_id_companies_id_fk" FOREIGN KEY ("company_id") REFERENCES "public"."companies"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "fault_acceptances" ADD CONSTRAINT "fault_acceptances_company_id_companies_id_fk" FOREIGN KEY ("company_id") REFERENCES "public"."companies"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "fault_acceptances" ADD CONSTRAINT "fault_acceptances_job" FOREIGN KEY ("company_id","job_id") REFERENCES "public"."jobs"("company_id","id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "job_events" ADD CONSTRAINT "job_events_company_id_companies_id_fk" FOREIGN KEY ("company_id") REFERENCES "public"."companies"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "job_events" ADD CONSTRAINT "job_events_job" FOREIGN KEY ("company_id","job_id") REFERENCES "public"."jobs"("company_id","id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "job_pricings" ADD CONSTRAINT "job_pricings_company_id_companies_id_fk" FOREIGN KEY ("company_id") REFERENCES "public"."companies"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "job_pricings" ADD CONSTRAINT "job_pricings_job" FOREIGN KEY ("company_id","job_id") REFERENCES "public"."jobs"("company_id","id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "price_books" ADD CONSTRAINT "price_books_company_id_companies_id_fk" FOREIGN KEY ("company_id") REFERENCES "public"."companies"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "approvals" ADD CONSTRAINT "approvals_company_id_companies_id_fk" FOREIGN KEY ("company_id") REFERENCES "public"."companies"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "approvals" ADD CONSTRAINT "approvals_of" FOREIGN KEY ("company_id","proposal_id") REFERENCES "public"."proposals"("company_id","id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "declines" ADD CONSTRAINT "declines_company_id_companies_id_fk" FOREIGN KEY ("company_id") REFERENCES "public"."companies"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "declines" ADD CONSTRAINT "declines_of" FOREIGN KEY ("company_id","proposal_id") REFERENCES "public"."proposals"("company_id","id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "proposal_links" ADD CONSTRAINT "proposal_links_company_id_companies_id_fk" FOREIGN KEY ("company_id") REFERENCES "public"."companies"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "proposal_links" ADD CONSTRAINT "proposal_links_of" FOREIGN KEY ("company_id","proposal_id") REFERENCES "public"."proposals"("company_id","id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "proposal_revisions" ADD CONSTRAINT "proposal_revisions_company_id_companies_id_fk" FOREIGN KEY ("company_id") REFERENCES "public"."companies"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "proposal_revisions" ADD CONSTRAINT "proposal_revisions_of" FOREIGN KEY ("company_id","proposal_id") REFERENCES "public"."proposals"("company_id","id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "proposal_texts" ADD CONSTRAINT "proposal_texts_company_id_companies_id_fk" FOREIGN KEY ("company_id") REFERENCES "public"."companies"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "proposals" ADD CONSTRAINT "proposals_company_id_companies_id_fk" FOREIGN KEY ("company_id") REFERENCES "public"."companies"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "proposals" ADD CONSTRAINT "proposals_of_job" FOREIGN KEY ("company_id","job_id") REFERENCES "public"."jobs"("company_id","id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "question_messages" ADD CONSTRAINT "question_messages_company_id_companies_id_fk" FOREIGN KEY ("company_id") REFERENCES "public"."companies"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "question_messages" ADD CONSTRAINT "question_messages_of" FOREIGN KEY ("company_id","question_id") REFERENCES "public"."questions"("company_id","id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "questions" ADD CONSTRAINT "questions_company_id_companies_id_fk" FOREIGN KEY ("company_id") REFERENCES "public"."companies"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "questions" ADD CONSTRAINT "questions_of" FOREIGN KEY ("company_id","proposal_id") REFERENCES "public"."proposals"("company_id","id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "money_documents_proposal_index" ON "money_documents" USING btree ("company_id","proposal_id");--> statement-breakpoint
CREATE UNIQUE INDEX "payments_checkout" ON "payments" USING btree ("checkout_id");--> statement-breakpoint
CREATE INDEX "payments_proposal" ON "payments" USING btree ("company_id","proposal_id");--> statement-breakpoint
CREATE INDEX "catalogue_imports_company" ON "catalogue_imports" USING btree ("company_id","created_at");--> statement-breakpoint
CREATE INDEX "catalogue_prices_newest" ON "catalogue_prices" USING btree ("company_id","item_id","created_at");--> statement-breakpoint
CREATE INDEX "fault_acceptances_of_job" ON "fault_acceptances" USING btree ("company_id","job_id");--> statement-breakpoint
CREATE INDEX "idempotency_keys_age" ON "idempotency_keys" USING btree ("created_at");--> statement-breakpoint
CREATE INDEX "job_events_of_job" ON "job_events" USING btree ("company_id","job_id","created_at");--> statement-breakpoint
CREATE INDEX "proposal_links_proposal" ON "proposal_links" USING btree ("company_id","proposal_id");--> statement-breakpoint
CREATE INDEX "question_messages_question" ON "question_messages" USING btree ("company_id","question_id","created_at");--> statement-breakpoint
CREATE INDEX "questions_proposal" ON "questions" USING btree ("company_id","proposal_id");