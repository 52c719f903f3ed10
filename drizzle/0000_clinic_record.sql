CREATE TABLE "audit_entries" (
	"clinic_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"at" timestamp with time zone NOT NULL,
	"actor_kind" text NOT NULL,
	"person_id" uuid,
	"action" text NOT NULL,
	"subject_id" uuid,
	"patient_id" uuid,
	"detail" jsonb,
	"join_key" text,
	CONSTRAINT "audit_entries_clinic_id_id_pk" PRIMARY KEY("clinic_id","id")
);
--> statement-breakpoint
CREATE TABLE "alert_mistakes" (
	"clinic_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"alert_id" uuid NOT NULL,
	"author_id" uuid NOT NULL,
	"client_id" uuid NOT NULL,
	"answered_at_device" text NOT NULL,
	"received_at" timestamp with time zone NOT NULL,
	CONSTRAINT "alert_mistakes_clinic_id_id_pk" PRIMARY KEY("clinic_id","id"),
	CONSTRAINT "alert_mistakes_author_client_id" UNIQUE("clinic_id","author_id","client_id")
);
--> statement-breakpoint
CREATE TABLE "alerts" (
	"clinic_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"patient_id" uuid NOT NULL,
	"author_id" uuid NOT NULL,
	"client_id" uuid NOT NULL,
	"answers" jsonb NOT NULL,
	"answered_at" timestamp with time zone NOT NULL,
	"answered_at_device" text,
	"received_at" timestamp with time zone NOT NULL,
	"local_date" date NOT NULL,
	"clock_doubtful" boolean DEFAULT false NOT NULL,
	"rules_version" text NOT NULL,
	"evaluated_at" timestamp with time zone,
	"check_in_client_id" uuid NOT NULL,
	CONSTRAINT "alerts_clinic_id_id_pk" PRIMARY KEY("clinic_id","id"),
	CONSTRAINT "alerts_author_client_id" UNIQUE("clinic_id","author_id","client_id")
);
--> statement-breakpoint
CREATE TABLE "check_ins" (
	"clinic_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"patient_id" uuid NOT NULL,
	"author_id" uuid NOT NULL,
	"client_id" uuid NOT NULL,
	"answers" jsonb NOT NULL,
	"answered_at" timestamp with time zone NOT NULL,
	"answered_at_device" text,
	"received_at" timestamp with time zone NOT NULL,
	"local_date" date NOT NULL,
	"clock_doubtful" boolean DEFAULT false NOT NULL,
	"rules_version" text NOT NULL,
	"evaluated_at" timestamp with time zone,
	"kind" text NOT NULL,
	CONSTRAINT "check_ins_clinic_id_id_pk" PRIMARY KEY("clinic_id","id"),
	CONSTRAINT "check_ins_author_client_id" UNIQUE("clinic_id","author_id","client_id")
);
--> statement-breakpoint
CREATE TABLE "clinics" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"name" text NOT NULL,
	"time_zone" text NOT NULL,
	"emergency_number" text NOT NULL,
	"crisis_number" text NOT NULL,
	"on_call_number" text NOT NULL,
	"phone" text NOT NULL,
	"opening_hours" jsonb NOT NULL,
	"is_demo" boolean DEFAULT false NOT NULL
);
--> statement-breakpoint
CREATE TABLE "findings" (
	"clinic_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"flag_id" uuid NOT NULL,
	"source_id" uuid NOT NULL,
	"code" text NOT NULL,
	"rule_version" integer NOT NULL,
	"urgency" text NOT NULL,
	"values" jsonb NOT NULL,
	"told_at" timestamp with time zone NOT NULL,
	CONSTRAINT "findings_clinic_id_id_pk" PRIMARY KEY("clinic_id","id"),
	CONSTRAINT "findings_once" UNIQUE("clinic_id","flag_id","source_id","code")
);
--> statement-breakpoint
CREATE TABLE "flag_events" (
	"clinic_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"flag_id" uuid NOT NULL,
	"kind" text NOT NULL,
	"at" timestamp with time zone NOT NULL,
	"by_person_id" uuid,
	"detail" text,
	"note" text,
	CONSTRAINT "flag_events_clinic_id_id_pk" PRIMARY KEY("clinic_id","id")
);
--> statement-breakpoint
CREATE TABLE "flags" (
	"clinic_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"patient_id" uuid NOT NULL,
	"source_author_id" uuid NOT NULL,
	"source_client_id" uuid NOT NULL,
	"urgency" text NOT NULL,
	"state" text DEFAULT 'open' NOT NULL,
	"raised_at" timestamp with time zone NOT NULL,
	"claimed_by" uuid,
	"claimed_at" timestamp with time zone,
	"closed_at" timestamp with time zone,
	"outcome" text,
	"worth_raising" text,
	CONSTRAINT "flags_clinic_id_id_pk" PRIMARY KEY("clinic_id","id"),
	CONSTRAINT "flags_source" UNIQUE("clinic_id","source_author_id","source_client_id")
);
--> statement-breakpoint
CREATE TABLE "browser_sessions" (
	"sid" varchar PRIMARY KEY NOT NULL,
	"sess" json NOT NULL,
	"expire" timestamp with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "credentials" (
	"person_id" uuid PRIMARY KEY NOT NULL,
	"clinic_id" uuid NOT NULL,
	"email" text NOT NULL,
	"password_hash" text NOT NULL,
	CONSTRAINT "credentials_email_unique" UNIQUE("email")
);
--> statement-breakpoint
CREATE TABLE "sign_in_attempts" (
	"email_hash" text PRIMARY KEY NOT NULL,
	"failures" integer NOT NULL,
	"blocked_until" timestamp with time zone NOT NULL,
	"last_at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "signed_in_sessions" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"clinic_id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"started_at" timestamp with time zone NOT NULL,
	"last_activity_at" timestamp with time zone NOT NULL,
	"idle_after_ms" integer,
	"ends_at" timestamp with time zone NOT NULL,
	"revoked_at" timestamp with time zone,
	"user_agent" text
);
--> statement-breakpoint
CREATE TABLE "worker_heartbeats" (
	"worker_id" uuid PRIMARY KEY NOT NULL,
	"beat_at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "notifications" (
	"clinic_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"person_id" uuid NOT NULL,
	"channel" text NOT NULL,
	"kind" text NOT NULL,
	"occasion" text NOT NULL,
	"path" text NOT NULL,
	"state" text DEFAULT 'pending' NOT NULL,
	"attempts" integer DEFAULT 0 NOT NULL,
	"last_error" text,
	"created_at" timestamp with time zone NOT NULL,
	"sent_at" timestamp with time zone,
	CONSTRAINT "notifications_clinic_id_id_pk" PRIMARY KEY("clinic_id","id"),
	CONSTRAINT "notifications_once" UNIQUE("clinic_id","person_id","channel","occasion")
);
--> statement-breakpoint
CREATE TABLE "care_team_members" (
	"clinic_id" uuid NOT NULL,
	"patient_id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"is_lead" boolean DEFAULT false NOT NULL,
	CONSTRAINT "care_team_members_clinic_id_patient_id_person_id_pk" PRIMARY KEY("clinic_id","patient_id","person_id")
);
--> statement-breakpoint
CREATE TABLE "operation_cards" (
	"clinic_id" uuid NOT NULL,
	"patient_id" uuid NOT NULL,
	"procedure" text NOT NULL,
	"arm" text NOT NULL,
	"surgery_date" date NOT NULL,
	"surgeon" text NOT NULL,
	"approach" text NOT NULL,
	"subscapularis" text NOT NULL,
	"biceps" text NOT NULL,
	"tuberosity" text,
	"limits" text,
	"block" text NOT NULL,
	"dressing_until_day" integer NOT NULL,
	CONSTRAINT "operation_cards_clinic_id_patient_id_pk" PRIMARY KEY("clinic_id","patient_id")
);
--> statement-breakpoint
CREATE TABLE "patients" (
	"clinic_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"person_id" uuid NOT NULL,
	"state" text DEFAULT 'active' NOT NULL,
	"chart_number" text NOT NULL,
	"birth_date" date NOT NULL,
	"phone" text NOT NULL,
	"address" text NOT NULL,
	"time_zone" text NOT NULL,
	"language" text DEFAULT 'English' NOT NULL,
	"dominant_hand" text NOT NULL,
	"emergency_contact" text NOT NULL,
	"blood_thinner" text,
	"allergies" text,
	"main_medicines" text,
	"equipment_at_home" text,
	"created_at" timestamp with time zone NOT NULL,
	CONSTRAINT "patients_clinic_id_id_pk" PRIMARY KEY("clinic_id","id"),
	CONSTRAINT "patients_clinicId_personId_unique" UNIQUE("clinic_id","person_id"),
	CONSTRAINT "patients_clinicId_chartNumber_unique" UNIQUE("clinic_id","chart_number")
);
--> statement-breakpoint
CREATE TABLE "people" (
	"clinic_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"name" text NOT NULL,
	"credential" text,
	"email" text NOT NULL,
	"active" boolean DEFAULT true NOT NULL,
	"created_at" timestamp with time zone NOT NULL,
	CONSTRAINT "people_clinic_id_id_pk" PRIMARY KEY("clinic_id","id")
);
--> statement-breakpoint
CREATE TABLE "person_roles" (
	"clinic_id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"role" text NOT NULL,
	CONSTRAINT "person_roles_clinic_id_person_id_role_pk" PRIMARY KEY("clinic_id","person_id","role")
);
--> statement-breakpoint
CREATE TABLE "plans" (
	"clinic_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"patient_id" uuid NOT NULL,
	"protocol_code" text NOT NULL,
	"protocol_version" integer NOT NULL,
	"content" jsonb NOT NULL,
	"created_at" timestamp with time zone NOT NULL,
	CONSTRAINT "plans_clinic_id_id_pk" PRIMARY KEY("clinic_id","id"),
	CONSTRAINT "plans_clinicId_patientId_unique" UNIQUE("clinic_id","patient_id")
);
--> statement-breakpoint
CREATE TABLE "sign_offs" (
	"clinic_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"plan_id" uuid NOT NULL,
	"kind" text NOT NULL,
	"code" text NOT NULL,
	"on_date" date NOT NULL,
	"by_person_id" uuid NOT NULL,
	CONSTRAINT "sign_offs_clinic_id_id_pk" PRIMARY KEY("clinic_id","id"),
	CONSTRAINT "sign_offs_clinicId_planId_kind_code_unique" UNIQUE("clinic_id","plan_id","kind","code")
);
--> statement-breakpoint
CREATE TABLE "messages" (
	"clinic_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"thread_id" uuid NOT NULL,
	"sequence" integer NOT NULL,
	"kind" text NOT NULL,
	"author_id" uuid,
	"author_side" text,
	"client_id" uuid,
	"text" text NOT NULL,
	"sent_at" timestamp with time zone NOT NULL,
	CONSTRAINT "messages_clinic_id_id_pk" PRIMARY KEY("clinic_id","id"),
	CONSTRAINT "messages_sequence" UNIQUE("clinic_id","thread_id","sequence"),
	CONSTRAINT "messages_author_client_id" UNIQUE("clinic_id","author_id","client_id")
);
--> statement-breakpoint
CREATE TABLE "thread_participants" (
	"clinic_id" uuid NOT NULL,
	"thread_id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"side" text NOT NULL,
	"seen_sequence" integer DEFAULT 0 NOT NULL,
	"seen_at" timestamp with time zone,
	CONSTRAINT "thread_participants_clinic_id_thread_id_person_id_pk" PRIMARY KEY("clinic_id","thread_id","person_id")
);
--> statement-breakpoint
CREATE TABLE "threads" (
	"clinic_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"patient_id" uuid NOT NULL,
	"author_id" uuid NOT NULL,
	"client_id" uuid NOT NULL,
	"subject" text NOT NULL,
	"state" text NOT NULL,
	"flag_id" uuid,
	"last_sequence" integer DEFAULT 0 NOT NULL,
	"last_at" timestamp with time zone NOT NULL,
	"created_at" timestamp with time zone NOT NULL,
	CONSTRAINT "threads_clinic_id_id_pk" PRIMARY KEY("clinic_id","id"),
	CONSTRAINT "threads_author_client_id" UNIQUE("clinic_id","author_id","client_id")
);
--> statement-breakpoint
ALTER TABLE "audit_entries" ADD CONSTRAINT "audit_entries_clinic_id_clinics_id_fk" FOREIGN KEY ("clinic_id") REFERENCES "public"."clinics"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "audit_entries" ADD CONSTRAINT "audit_entries_clinic_id_person_id_people_clinic_id_id_fk" FOREIGN KEY ("clinic_id","person_id") REFERENCES "public"."people"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "alert_mistakes" ADD CONSTRAINT "alert_mistakes_clinic_id_clinics_id_fk" FOREIGN KEY ("clinic_id") REFERENCES "public"."clinics"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "alert_mistakes" ADD CONSTRAINT "alert_mistakes_clinic_id_alert_id_alerts_clinic_id_id_fk" FOREIGN KEY ("clinic_id","alert_id") REFERENCES "public"."alerts"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "alert_mistakes" ADD CONSTRAINT "alert_mistakes_clinic_id_author_id_people_clinic_id_id_fk" FOREIGN KEY ("clinic_id","author_id") REFERENCES "public"."people"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "alerts" ADD CONSTRAINT "alerts_clinic_id_clinics_id_fk" FOREIGN KEY ("clinic_id") REFERENCES "public"."clinics"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "alerts" ADD CONSTRAINT "alerts_clinic_id_patient_id_patients_clinic_id_id_fk" FOREIGN KEY ("clinic_id","patient_id") REFERENCES "public"."patients"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "alerts" ADD CONSTRAINT "alerts_clinic_id_author_id_people_clinic_id_id_fk" FOREIGN KEY ("clinic_id","author_id") REFERENCES "public"."people"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "check_ins" ADD CONSTRAINT "check_ins_clinic_id_clinics_id_fk" FOREIGN KEY ("clinic_id") REFERENCES "public"."clinics"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "check_ins" ADD CONSTRAINT "check_ins_clinic_id_patient_id_patients_clinic_id_id_fk" FOREIGN KEY ("clinic_id","patient_id") REFERENCES "public"."patients"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "check_ins" ADD CONSTRAINT "check_ins_clinic_id_author_id_people_clinic_id_id_fk" FOREIGN KEY ("clinic_id","author_id") REFERENCES "public"."people"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "findings" ADD CONSTRAINT "findings_clinic_id_clinics_id_fk" FOREIGN KEY ("clinic_id") REFERENCES "public"."clinics"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "findings" ADD CONSTRAINT "findings_clinic_id_flag_id_flags_clinic_id_id_fk" FOREIGN KEY ("clinic_id","flag_id") REFERENCES "public"."flags"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "flag_events" ADD CONSTRAINT "flag_events_clinic_id_clinics_id_fk" FOREIGN KEY ("clinic_id") REFERENCES "public"."clinics"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "flag_events" ADD CONSTRAINT "flag_events_clinic_id_flag_id_flags_clinic_id_id_fk" FOREIGN KEY ("clinic_id","flag_id") REFERENCES "public"."flags"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "flag_events" ADD CONSTRAINT "flag_events_clinic_id_by_person_id_people_clinic_id_id_fk" FOREIGN KEY ("clinic_id","by_person_id") REFERENCES "public"."people"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "flags" ADD CONSTRAINT "flags_clinic_id_clinics_id_fk" FOREIGN KEY ("clinic_id") REFERENCES "public"."clinics"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "flags" ADD CONSTRAINT "flags_clinic_id_patient_id_patients_clinic_id_id_fk" FOREIGN KEY ("clinic_id","patient_id") REFERENCES "public"."patients"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "flags" ADD CONSTRAINT "flags_clinic_id_source_author_id_people_clinic_id_id_fk" FOREIGN KEY ("clinic_id","source_author_id") REFERENCES "public"."people"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "flags" ADD CONSTRAINT "flags_clinic_id_claimed_by_people_clinic_id_id_fk" FOREIGN KEY ("clinic_id","claimed_by") REFERENCES "public"."people"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "notifications" ADD CONSTRAINT "notifications_clinic_id_clinics_id_fk" FOREIGN KEY ("clinic_id") REFERENCES "public"."clinics"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "notifications" ADD CONSTRAINT "notifications_clinic_id_person_id_people_clinic_id_id_fk" FOREIGN KEY ("clinic_id","person_id") REFERENCES "public"."people"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "care_team_members" ADD CONSTRAINT "care_team_members_clinic_id_patient_id_patients_clinic_id_id_fk" FOREIGN KEY ("clinic_id","patient_id") REFERENCES "public"."patients"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "care_team_members" ADD CONSTRAINT "care_team_members_clinic_id_person_id_people_clinic_id_id_fk" FOREIGN KEY ("clinic_id","person_id") REFERENCES "public"."people"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "operation_cards" ADD CONSTRAINT "operation_cards_clinic_id_patient_id_patients_clinic_id_id_fk" FOREIGN KEY ("clinic_id","patient_id") REFERENCES "public"."patients"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "patients" ADD CONSTRAINT "patients_clinic_id_clinics_id_fk" FOREIGN KEY ("clinic_id") REFERENCES "public"."clinics"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "patients" ADD CONSTRAINT "patients_clinic_id_person_id_people_clinic_id_id_fk" FOREIGN KEY ("clinic_id","person_id") REFERENCES "public"."people"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "people" ADD CONSTRAINT "people_clinic_id_clinics_id_fk" FOREIGN KEY ("clinic_id") REFERENCES "public"."clinics"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "person_roles" ADD CONSTRAINT "person_roles_clinic_id_person_id_people_clinic_id_id_fk" FOREIGN KEY ("clinic_id","person_id") REFERENCES "public"."people"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "plans" ADD CONSTRAINT "plans_clinic_id_clinics_id_fk" FOREIGN KEY ("clinic_id") REFERENCES "public"."clinics"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "plans" ADD CONSTRAINT "plans_clinic_id_patient_id_patients_clinic_id_id_fk" FOREIGN KEY ("clinic_id","patient_id") REFERENCES "public"."patients"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sign_offs" ADD CONSTRAINT "sign_offs_clinic_id_clinics_id_fk" FOREIGN KEY ("clinic_id") REFERENCES "public"."clinics"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sign_offs" ADD CONSTRAINT "sign_offs_clinic_id_plan_id_plans_clinic_id_id_fk" FOREIGN KEY ("clinic_id","plan_id") REFERENCES "public"."plans"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sign_offs" ADD CONSTRAINT "sign_offs_clinic_id_by_person_id_people_clinic_id_id_fk" FOREIGN KEY ("clinic_id","by_person_id") REFERENCES "public"."people"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "messages" ADD CONSTRAINT "messages_clinic_id_clinics_id_fk" FOREIGN KEY ("clinic_id") REFERENCES "public"."clinics"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "messages" ADD CONSTRAINT "messages_clinic_id_thread_id_threads_clinic_id_id_fk" FOREIGN KEY ("clinic_id","thread_id") REFERENCES "public"."threads"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "messages" ADD CONSTRAINT "messages_clinic_id_author_id_people_clinic_id_id_fk" FOREIGN KEY ("clinic_id","author_id") REFERENCES "public"."people"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "thread_participants" ADD CONSTRAINT "thread_participants_clinic_id_thread_id_threads_clinic_id_id_fk" FOREIGN KEY ("clinic_id","thread_id") REFERENCES "public"."threads"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "thread_participants" ADD CONSTRAINT "thread_participants_clinic_id_person_id_people_clinic_id_id_fk" FOREIGN KEY ("clinic_id","person_id") REFERENCES "public"."people"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "threads" ADD CONSTRAINT "threads_clinic_id_clinics_id_fk" FOREIGN KEY ("clinic_id") REFERENCES "public"."clinics"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "threads" ADD CONSTRAINT "threads_clinic_id_patient_id_patients_clinic_id_id_fk" FOREIGN KEY ("clinic_id","patient_id") REFERENCES "public"."patients"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "threads" ADD CONSTRAINT "threads_clinic_id_author_id_people_clinic_id_id_fk" FOREIGN KEY ("clinic_id","author_id") REFERENCES "public"."people"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "threads" ADD CONSTRAINT "threads_clinic_id_flag_id_flags_clinic_id_id_fk" FOREIGN KEY ("clinic_id","flag_id") REFERENCES "public"."flags"("clinic_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "audit_entries_clinic_id_patient_id_at_index" ON "audit_entries" USING btree ("clinic_id","patient_id","at");--> statement-breakpoint
CREATE UNIQUE INDEX "audit_entries_join" ON "audit_entries" USING btree ("clinic_id","join_key");--> statement-breakpoint
CREATE INDEX "alerts_unevaluated" ON "alerts" USING btree ("received_at") WHERE evaluated_at is null;--> statement-breakpoint
CREATE INDEX "check_ins_clinic_id_patient_id_answered_at_index" ON "check_ins" USING btree ("clinic_id","patient_id","answered_at");--> statement-breakpoint
CREATE INDEX "check_ins_unevaluated" ON "check_ins" USING btree ("received_at") WHERE evaluated_at is null;--> statement-breakpoint
CREATE INDEX "flag_events_clinic_id_flag_id_at_index" ON "flag_events" USING btree ("clinic_id","flag_id","at");--> statement-breakpoint
CREATE UNIQUE INDEX "flag_events_raised_once" ON "flag_events" USING btree ("clinic_id","flag_id") WHERE kind = 'raised';--> statement-breakpoint
CREATE UNIQUE INDEX "flag_events_seen_once" ON "flag_events" USING btree ("clinic_id","flag_id","by_person_id","detail") WHERE kind = 'seen';--> statement-breakpoint
CREATE UNIQUE INDEX "flag_events_replied_once" ON "flag_events" USING btree ("clinic_id","flag_id","detail") WHERE kind = 'replied';--> statement-breakpoint
CREATE INDEX "flags_round" ON "flags" USING btree ("clinic_id","raised_at") WHERE state <> 'closed';--> statement-breakpoint
CREATE INDEX "flags_clinic_id_patient_id_raised_at_index" ON "flags" USING btree ("clinic_id","patient_id","raised_at");--> statement-breakpoint
CREATE INDEX "browser_sessions_expire_index" ON "browser_sessions" USING btree ("expire");--> statement-breakpoint
CREATE INDEX "signed_in_sessions_person_id_index" ON "signed_in_sessions" USING btree ("person_id");--> statement-breakpoint
CREATE INDEX "notifications_waiting" ON "notifications" USING btree ("created_at") WHERE state = 'pending';--> statement-breakpoint
CREATE INDEX "care_team_members_clinic_id_person_id_index" ON "care_team_members" USING btree ("clinic_id","person_id");--> statement-breakpoint
CREATE INDEX "thread_participants_clinic_id_person_id_index" ON "thread_participants" USING btree ("clinic_id","person_id");--> statement-breakpoint
CREATE UNIQUE INDEX "threads_one_per_flag" ON "threads" USING btree ("clinic_id","flag_id") WHERE flag_id is not null;--> statement-breakpoint
CREATE INDEX "threads_clinic_id_patient_id_last_at_index" ON "threads" USING btree ("clinic_id","patient_id","last_at");