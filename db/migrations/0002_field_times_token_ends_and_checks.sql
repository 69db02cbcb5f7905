ALTER TABLE "changes" DROP CONSTRAINT "changes_org_id_to_gain_set_id_gain_sets_org_id_id_fk";
--> statement-breakpoint
ALTER TABLE "changes" DROP CONSTRAINT "changes_org_id_from_gain_set_id_gain_sets_org_id_id_fk";
--> statement-breakpoint
ALTER TABLE "field_reports" ADD COLUMN "entered_at" timestamp with time zone;--> statement-breakpoint
ALTER TABLE "api_tokens" ADD COLUMN "revoked_at" timestamp with time zone;--> statement-breakpoint
ALTER TABLE "gain_sets" ADD CONSTRAINT "gain_sets_of_axis" UNIQUE("org_id","axis_id","id");--> statement-breakpoint
ALTER TABLE "changes" ADD CONSTRAINT "changes_to" FOREIGN KEY ("org_id","axis_id","to_gain_set_id") REFERENCES "public"."gain_sets"("org_id","axis_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "changes" ADD CONSTRAINT "changes_from" FOREIGN KEY ("org_id","axis_id","from_gain_set_id") REFERENCES "public"."gain_sets"("org_id","axis_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "axes_in_order" ON "axes" USING btree ("org_id","tag","id");--> statement-breakpoint
CREATE INDEX "api_tokens_person" ON "api_tokens" USING btree ("org_id","person_id");--> statement-breakpoint
ALTER TABLE "changes" ADD CONSTRAINT "changes_safety_function" CHECK ("changes"."safety_function" in ('no', 'yes', 'unknown'));--> statement-breakpoint
ALTER TABLE "field_reports" ADD CONSTRAINT "field_reports_kind" CHECK ("field_reports"."kind" in ('apply', 'verify', 'roll-back'));--> statement-breakpoint
ALTER TABLE "gain_sets" ADD CONSTRAINT "gain_sets_version_counts_from_1" CHECK ("gain_sets"."version" > 0);--> statement-breakpoint
ALTER TABLE "axes" ADD CONSTRAINT "axes_sample_time" CHECK ("axes"."sample_time_s" > 0);--> statement-breakpoint
ALTER TABLE "axes" ADD CONSTRAINT "axes_actuator_slew" CHECK ("axes"."actuator_slew" > 0);--> statement-breakpoint
ALTER TABLE "api_tokens" ADD CONSTRAINT "api_tokens_role" CHECK ("api_tokens"."role" = any (array['engineer', 'approver', 'technician', 'admin']));--> statement-breakpoint
ALTER TABLE "memberships" ADD CONSTRAINT "memberships_roles" CHECK (cardinality("memberships"."roles") > 0 and "memberships"."roles" <@ array['engineer', 'approver', 'technician', 'admin']);--> statement-breakpoint
ALTER TABLE "persons" ADD CONSTRAINT "persons_email_lower_case" CHECK ("persons"."email" = lower("persons"."email"));