DROP INDEX "load_phase_window";--> statement-breakpoint
DROP INDEX "allocation_window";--> statement-breakpoint
ALTER TABLE "request" ADD COLUMN "withdraw_reason" text;--> statement-breakpoint
CREATE INDEX "allocation_window" ON "allocation" USING gist ("during") WHERE "allocation"."live";