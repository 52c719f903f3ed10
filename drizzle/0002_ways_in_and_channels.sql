CREATE TABLE "caregivers" (
	"clinic_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"patient_id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"relationship" text NOT NULL,
	"may_check_in" boolean NOT NULL,
	"may_message" boolean NOT NULL,
	"until_date" date,
	"granted_by" uuid NOT NULL,
	"consent" text,
	"created_at" timestamp with time zone NOT NULL,
	"ended_at" timestamp with time zone,
	"ended_by" uuid,
	CONSTRAINT "caregivers_clinic_id_id_pk" PRIMARY KEY("clinic_id","id")
);
--> statement-breakpoint
CREATE TABLE "authenticators" (
	"person_id" uuid PRIMARY KEY NOT NULL,
	"clinic_id" uuid NOT NULL,
	"sealed_secret" text NOT NULL,
	"confirmed_at" timestamp with time zone,
	"last_step" integer
);
--> statement-breakpoint
CREATE TABLE "one_time_tokens" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"clinic_id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"kind" text NOT NULL,
	"code_hash" text,
	"email" text,
	"created_at" timestamp with time zone NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"used_at" timestamp with time zone,
	"revoked_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "passkey_challenges" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"challenge" text NOT NULL,
	"purpose" text NOT NULL,
	"person_id" uuid,
	"expires_at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "passkeys" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"clinic_id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"credential_id" text NOT NULL,
	"public_key" text NOT NULL,
	"counter" bigint NOT NULL,
	"transports" text[] NOT NULL,
	"backed_up" boolean NOT NULL,
	"name" text NOT NULL,
	"created_at" timestamp with time zone NOT NULL,
	"last_used_at" timestamp with time zone,
	CONSTRAINT "passkeys_credentialId_unique" UNIQUE("credential_id")
);
--> statement-breakpoint
CREATE TABLE "pending_sign_ins" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"clinic_id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"tries" integer DEFAULT 0 NOT NULL,
	"expires_at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "recovery_codes" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"clinic_id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"code_hash" text NOT NULL,
	"used_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "invitations" (
	"clinic_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"person_id" uuid NOT NULL,
	"kind" text NOT NULL,
	"by_email" boolean NOT NULL,
	"created_by" uuid NOT NULL,
	"created_at" timestamp with time zone NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"accepted_at" timestamp with time zone,
	"revoked_at" timestamp with time zone,
	"asked_again_at" timestamp with time zone,
	CONSTRAINT "invitations_clinic_id_id_pk" PRIMARY KEY("clinic_id","id")
);
--> statement-breakpoint
CREATE TABLE "two_person_acts" (
	"clinic_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"kind" text NOT NULL,
	"person_id" uuid NOT NULL,
	"role" text,
	"reason" text NOT NULL,
	"state" text NOT NULL,
	"requested_by" uuid NOT NULL,
	"requested_at" timestamp with time zone NOT NULL,
	"decided_by" uuid,
	"decided_at" timestamp with time zone,
	CONSTRAINT "two_person_acts_clinic_id_id_pk" PRIMARY KEY("clinic_id","id")
);
--> statement-breakpoint
CREATE TABLE "notification_settings" (
	"clinic_id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"kind" text NOT NULL,
	"channel" text NOT NULL,
	"enabled" boolean NOT NULL,
	CONSTRAINT "notification_settings_clinic_id_person_id_kind_channel_pk" PRIMARY KEY("clinic_id","person_id","kind","channel")
);
--> statement-breakpoint
CREATE TABLE "push_subscriptions" (
	"clinic_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"person_id" uuid NOT NULL,
	"session_id" uuid NOT NULL,
	"endpoint" text NOT NULL,
	"p256dh" text NOT NULL,
	"auth" text NOT NULL,
	"device_name" text NOT NULL,
	"created_at" timestamp with time zone NOT NULL,
	"last_sent_at" timestamp with time zone,
	CONSTRAINT "push_subscriptions_clinic_id_id_pk" PRIMARY KEY("clinic_id","id"),
	CONSTRAINT "push_subscriptions_endpoint" UNIQUE("clinic_id","endpoint")
);
--> statement-breakpoint
CREATE TABLE "chart_openings" (
	"clinic_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"patient_id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"reason" text NOT NULL,
	"at" timestamp with time zone NOT NULL,
	CONSTRAINT "chart_openings_clinic_id_id_pk" PRIMARY KEY("clinic_id","id")
);
--> statement-breakpoint
CREATE TABLE "patient_state_changes" (
	"clinic_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"patient_id" uuid NOT NULL,
	"from_state" text NOT NULL,
	"to_state" text NOT NULL,
	"reason" text NOT NULL,
	"back_on" date,
	"by_person_id" uuid NOT NULL,
	"at" timestamp with time zone NOT NULL,
	CONSTRAINT "patient_state_changes_clinic_id_id_pk" PRIMARY KEY("clinic_id","id")
);
--> statement-breakpoint
ALTER TABLE "notifications" DROP CONSTRAINT "notifications_once";--> statement-breakpoint
ALTER TABLE "credentials" ALTER COLUMN "password_hash" DROP NOT NULL;--> statement-breakpoint
ALTER TABLE "clinics" ADD COLUMN "country" text DEFAULT 'US' NOT NULL;--> statement-breakpoint
ALTER TABLE "signed_in_sessions" ADD COLUMN "proven_at" timestamp with time zone DEFAULT to_timestamp(0) NOT NULL;--> statement-breakpoint
ALTER TABLE "signed_in_sessions" ADD COLUMN "second_factor" text;--> statement-breakpoint
ALTER TABLE "notifications" ADD COLUMN "target" text DEFAULT '' NOT NULL;--> statement-breakpoint
ALTER TABLE "notifications" ADD COLUMN "due_at" timestamp with time zone DEFAULT now() NOT NULL;--> statement-breakpoint
ALTER TABLE "notifications" ADD COLUMN "leased_until" timestamp with time zone;--> statement-breakpoint
ALTER TABLE "notifications" ADD COLUMN "provider_id" text;--> statement-breakpoint
ALTER TABLE "notifications" ADD COLUMN "outcome" text;--> statement-breakpoint
ALTER TABLE "notifications" ADD COLUMN "acknowledged_at" timestamp with time zone;--> statement-breakpoint
ALTER TABLE "patients" ADD COLUMN "consent_on" date;--> statement-breakpoint
ALTER TABLE "patients" ADD COLUMN "consent_how" text;--> statement-breakpoint
ALTER TABLE "patients" ADD COLUMN "consent_by" uuid;--> statement-breakpoint
ALTER TABLE "people" ADD COLUMN "phone" text;--> statement-breakpoint
ALTER TABLE "people" ADD COLUMN "time_zone" text;--> statement-breakpoint
ALTER TABLE "people" ADD COLUMN "quiet_from" text;--> statement-breakpoint
ALTER TABLE "people" ADD COLUMN "quiet_until" text;--> statement-breakpoint
ALTER TABLE "people" ADD COLUMN "remind_at" text;--> statement-breakpoint
ALTER TABLE "people" ADD COLUMN "deactivated_at" timestamp with time zone;--> statement-breakpoint
ALTER TABLE "people" ADD COLUMN "first_signed_in_at" timestamp with time zone;--> statement-breakpoint
ALTER TABLE "people" ADD COLUMN "email_bounced_at" timestamp with time zone;--> statement-breakpoint
ALTER TABLE "caregivers" ADD CONSTRAINT "caregivers_clinic_id_clinics_id_fk" FOREIGN KEY ("clinic_id") REFERENCES "public"."clinics"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "caregivers" ADD CONSTRAINT "caregivers_clinic_id_patient_id_patients_clinic_id_id_fk" FOREIGN KEY ("clinic_id","patient_id") REFERENCES "public"."patients"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "caregivers" ADD CONSTRAINT "caregivers_clinic_id_person_id_people_clinic_id_id_fk" FOREIGN KEY ("clinic_id","person_id") REFERENCES "public"."people"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "caregivers" ADD CONSTRAINT "caregivers_clinic_id_granted_by_people_clinic_id_id_fk" FOREIGN KEY ("clinic_id","granted_by") REFERENCES "public"."people"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "caregivers" ADD CONSTRAINT "caregivers_clinic_id_ended_by_people_clinic_id_id_fk" FOREIGN KEY ("clinic_id","ended_by") REFERENCES "public"."people"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invitations" ADD CONSTRAINT "invitations_clinic_id_clinics_id_fk" FOREIGN KEY ("clinic_id") REFERENCES "public"."clinics"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invitations" ADD CONSTRAINT "invitations_clinic_id_person_id_people_clinic_id_id_fk" FOREIGN KEY ("clinic_id","person_id") REFERENCES "public"."people"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invitations" ADD CONSTRAINT "invitations_clinic_id_created_by_people_clinic_id_id_fk" FOREIGN KEY ("clinic_id","created_by") REFERENCES "public"."people"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "two_person_acts" ADD CONSTRAINT "two_person_acts_clinic_id_clinics_id_fk" FOREIGN KEY ("clinic_id") REFERENCES "public"."clinics"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "two_person_acts" ADD CONSTRAINT "two_person_acts_clinic_id_person_id_people_clinic_id_id_fk" FOREIGN KEY ("clinic_id","person_id") REFERENCES "public"."people"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "two_person_acts" ADD CONSTRAINT "two_person_acts_clinic_id_requested_by_people_clinic_id_id_fk" FOREIGN KEY ("clinic_id","requested_by") REFERENCES "public"."people"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "two_person_acts" ADD CONSTRAINT "two_person_acts_clinic_id_decided_by_people_clinic_id_id_fk" FOREIGN KEY ("clinic_id","decided_by") REFERENCES "public"."people"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "notification_settings" ADD CONSTRAINT "notification_settings_clinic_id_person_id_people_clinic_id_id_fk" FOREIGN KEY ("clinic_id","person_id") REFERENCES "public"."people"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "push_subscriptions" ADD CONSTRAINT "push_subscriptions_clinic_id_clinics_id_fk" FOREIGN KEY ("clinic_id") REFERENCES "public"."clinics"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "push_subscriptions" ADD CONSTRAINT "push_subscriptions_clinic_id_person_id_people_clinic_id_id_fk" FOREIGN KEY ("clinic_id","person_id") REFERENCES "public"."people"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "chart_openings" ADD CONSTRAINT "chart_openings_clinic_id_clinics_id_fk" FOREIGN KEY ("clinic_id") REFERENCES "public"."clinics"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "chart_openings" ADD CONSTRAINT "chart_openings_clinic_id_patient_id_patients_clinic_id_id_fk" FOREIGN KEY ("clinic_id","patient_id") REFERENCES "public"."patients"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "chart_openings" ADD CONSTRAINT "chart_openings_clinic_id_person_id_people_clinic_id_id_fk" FOREIGN KEY ("clinic_id","person_id") REFERENCES "public"."people"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "patient_state_changes" ADD CONSTRAINT "patient_state_changes_clinic_id_clinics_id_fk" FOREIGN KEY ("clinic_id") REFERENCES "public"."clinics"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "patient_state_changes" ADD CONSTRAINT "patient_state_changes_clinic_id_patient_id_patients_clinic_id_id_fk" FOREIGN KEY ("clinic_id","patient_id") REFERENCES "public"."patients"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "patient_state_changes" ADD CONSTRAINT "patient_state_changes_clinic_id_by_person_id_people_clinic_id_id_fk" FOREIGN KEY ("clinic_id","by_person_id") REFERENCES "public"."people"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE UNIQUE INDEX "caregivers_one_open" ON "caregivers" USING btree ("clinic_id","patient_id","person_id") WHERE ended_at is null;--> statement-breakpoint
CREATE INDEX "caregivers_clinic_id_person_id_index" ON "caregivers" USING btree ("clinic_id","person_id");--> statement-breakpoint
CREATE INDEX "one_time_tokens_person_id_index" ON "one_time_tokens" USING btree ("person_id");--> statement-breakpoint
CREATE UNIQUE INDEX "one_time_tokens_code" ON "one_time_tokens" USING btree ("code_hash") WHERE code_hash is not null;--> statement-breakpoint
CREATE INDEX "passkeys_person_id_index" ON "passkeys" USING btree ("person_id");--> statement-breakpoint
CREATE INDEX "recovery_codes_person_id_index" ON "recovery_codes" USING btree ("person_id");--> statement-breakpoint
CREATE INDEX "invitations_clinic_id_person_id_created_at_index" ON "invitations" USING btree ("clinic_id","person_id","created_at");--> statement-breakpoint
CREATE INDEX "two_person_acts_clinic_id_state_index" ON "two_person_acts" USING btree ("clinic_id","state");--> statement-breakpoint
CREATE INDEX "push_subscriptions_clinic_id_person_id_index" ON "push_subscriptions" USING btree ("clinic_id","person_id");--> statement-breakpoint
CREATE INDEX "push_subscriptions_clinic_id_session_id_index" ON "push_subscriptions" USING btree ("clinic_id","session_id");--> statement-breakpoint
CREATE INDEX "chart_openings_clinic_id_patient_id_person_id_at_index" ON "chart_openings" USING btree ("clinic_id","patient_id","person_id","at");--> statement-breakpoint
CREATE INDEX "patient_state_changes_clinic_id_patient_id_at_index" ON "patient_state_changes" USING btree ("clinic_id","patient_id","at");--> statement-breakpoint
CREATE INDEX "notifications_due" ON "notifications" USING btree ("due_at") WHERE state = 'pending';--> statement-breakpoint
CREATE INDEX "notifications_provider" ON "notifications" USING btree ("clinic_id","provider_id");--> statement-breakpoint
ALTER TABLE "notifications" ADD CONSTRAINT "notifications_once" UNIQUE("clinic_id","person_id","channel","occasion","target");--> statement-breakpoint
-- The fence of the new tables.
do $$
declare
  fenced text;
begin
  foreach fenced in array array[
    'patient_state_changes', 'chart_openings', 'caregivers', 'invitations', 'two_person_acts',
    'notification_settings', 'push_subscriptions'
  ] loop
    execute format('alter table %I enable row level security', fenced);
    execute format('alter table %I force row level security', fenced);
    execute format(
      'create policy clinic_fence on %I using (clinic_id = (select nullif(current_setting(''app.clinic_id'', true), '''')::uuid))',
      fenced
    );
  end loop;
end
$$;
--> statement-breakpoint
-- Records are kept by the clinic's own people now. What was said about a change of state or an opening stays said.
grant insert, update on people, patients, operation_cards, caregivers, invitations, two_person_acts to espalier_app;
--> statement-breakpoint
grant insert on plans, patient_state_changes, chart_openings to espalier_app;
--> statement-breakpoint
grant select on
  patient_state_changes, chart_openings, caregivers, invitations, two_person_acts,
  notification_settings, push_subscriptions
to espalier_app;
--> statement-breakpoint
grant insert, update, delete on care_team_members, person_roles, notification_settings, push_subscriptions
to espalier_app;
--> statement-breakpoint
-- The patient reads who opened their record: the audit is read, and still never changed.
grant select on audit_entries to espalier_app;
--> statement-breakpoint
-- The gate's new tables hold ways in and nothing of a patient's record.
grant select, insert, update, delete on
  passkeys, passkey_challenges, authenticators, recovery_codes, pending_sign_ins, one_time_tokens
to espalier_gate;
--> statement-breakpoint
-- What is due to be sent, and the clinics whose timed work is due: ids only.
grant select (clinic_id, id, state, due_at, leased_until, kind) on notifications to espalier_finder;
--> statement-breakpoint
create policy finder_reads_ids on notifications for select to espalier_finder using (true);
--> statement-breakpoint
create function due_notifications(before timestamptz, at_most int)
  returns table (clinic_id uuid, id uuid)
  language sql stable security definer set search_path = pg_catalog, public
  as $$
    select n.clinic_id, n.id
    from public.notifications n
    where n.state = 'pending' and n.due_at <= before and (n.leased_until is null or n.leased_until <= before)
    order by case n.kind when 'new-emergency' then 0 when 'new-urgent' then 1 else 2 end, n.due_at, n.id
    limit at_most
  $$;
--> statement-breakpoint
create function all_clinic_ids() returns table (clinic_id uuid)
  language sql stable security definer set search_path = pg_catalog, public
  as $$ select id from public.clinics order by id $$;
--> statement-breakpoint
grant create on schema public to espalier_finder;
--> statement-breakpoint
alter function due_notifications(timestamptz, int) owner to espalier_finder;
--> statement-breakpoint
alter function all_clinic_ids() owner to espalier_finder;
--> statement-breakpoint
revoke create on schema public from espalier_finder;
--> statement-breakpoint
revoke execute on function due_notifications(timestamptz, int), all_clinic_ids() from public;
--> statement-breakpoint
grant execute on function due_notifications(timestamptz, int), all_clinic_ids() to espalier_app;
