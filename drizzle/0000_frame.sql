CREATE TABLE `invitations` (
	`id` text PRIMARY KEY NOT NULL,
	`kind` text NOT NULL,
	`token_hash` text NOT NULL,
	`user_id` text,
	`created_at` integer NOT NULL,
	`expires_at` integer NOT NULL,
	`used_at` integer,
	FOREIGN KEY (`user_id`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `invitations_token_hash_unique` ON `invitations` (`token_hash`);--> statement-breakpoint
CREATE TABLE `personal_tokens` (
	`id` text PRIMARY KEY NOT NULL,
	`user_id` text NOT NULL,
	`name` text NOT NULL,
	`token_hash` text NOT NULL,
	`created_at` integer NOT NULL,
	`revoked_at` integer,
	FOREIGN KEY (`user_id`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `personal_tokens_token_hash_unique` ON `personal_tokens` (`token_hash`);--> statement-breakpoint
CREATE TABLE `sign_in_failures` (
	`subject` text PRIMARY KEY NOT NULL,
	`count` integer NOT NULL,
	`last_at` integer NOT NULL,
	`blocked_until` integer
);
--> statement-breakpoint
CREATE TABLE `sign_ins` (
	`id` text PRIMARY KEY NOT NULL,
	`user_id` text NOT NULL,
	`expires_at` integer NOT NULL,
	`created_at` integer NOT NULL,
	FOREIGN KEY (`user_id`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `sign_ins_user` ON `sign_ins` (`user_id`);--> statement-breakpoint
CREATE TABLE `units` (
	`id` text PRIMARY KEY NOT NULL,
	`name` text NOT NULL,
	`kind` text NOT NULL,
	`zone` text NOT NULL
);
--> statement-breakpoint
CREATE UNIQUE INDEX `units_name_unique` ON `units` (`name`);--> statement-breakpoint
CREATE TABLE `user_units` (
	`user_id` text NOT NULL,
	`unit_id` text NOT NULL,
	PRIMARY KEY(`user_id`, `unit_id`),
	FOREIGN KEY (`user_id`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`unit_id`) REFERENCES `units`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `user_units_unit` ON `user_units` (`unit_id`);--> statement-breakpoint
CREATE TABLE `users` (
	`id` text PRIMARY KEY NOT NULL,
	`email` text NOT NULL,
	`name` text NOT NULL,
	`role` text NOT NULL,
	`password_hash` text,
	`phone` text,
	`created_at` integer NOT NULL,
	`disabled_at` integer
);
--> statement-breakpoint
CREATE UNIQUE INDEX `users_email_unique` ON `users` (`email`);--> statement-breakpoint
CREATE TABLE `bedside_sessions` (
	`id` text PRIMARY KEY NOT NULL,
	`episode_id` text NOT NULL,
	`operation_id` text,
	`started_at` integer NOT NULL,
	`ended_at` integer NOT NULL,
	`level` integer NOT NULL,
	`context` text NOT NULL,
	`symptoms` text NOT NULL,
	`activities` text NOT NULL,
	`outcome` text NOT NULL,
	`not_judged` text NOT NULL,
	`limit_set` text NOT NULL,
	`limit_version` text NOT NULL,
	`deviation` text,
	`recorded_by` text NOT NULL,
	`recorded_at` integer NOT NULL,
	FOREIGN KEY (`episode_id`) REFERENCES `episodes`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`operation_id`) REFERENCES `operations`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`recorded_by`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `bedside_sessions_episode` ON `bedside_sessions` (`episode_id`,`started_at`);--> statement-breakpoint
CREATE TABLE `findings` (
	`id` text PRIMARY KEY NOT NULL,
	`session_id` text NOT NULL,
	`ordinal` integer NOT NULL,
	`rule` text NOT NULL,
	`grade` text NOT NULL,
	`reading` text NOT NULL,
	`measured` text,
	`limit` text,
	`unit` text,
	`reason` text NOT NULL,
	`source` text NOT NULL,
	FOREIGN KEY (`session_id`) REFERENCES `bedside_sessions`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `findings_session` ON `findings` (`session_id`,`ordinal`);--> statement-breakpoint
CREATE TABLE `readings` (
	`id` text PRIMARY KEY NOT NULL,
	`session_id` text NOT NULL,
	`phase` text NOT NULL,
	`ordinal` integer NOT NULL,
	`at` integer,
	`posture` text,
	`settled` integer,
	`work` real,
	`bp_source` text,
	`rhythm` text,
	`hr` real,
	`sbp` real,
	`dbp` real,
	`spo2` real,
	`rr` real,
	`rpe` real,
	`pain` real,
	`oxygen_lpm` real,
	FOREIGN KEY (`session_id`) REFERENCES `bedside_sessions`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `readings_session` ON `readings` (`session_id`,`phase`,`ordinal`);--> statement-breakpoint
CREATE TABLE `clearance_moves` (
	`id` text PRIMARY KEY NOT NULL,
	`clearance_id` text NOT NULL,
	`at` integer NOT NULL,
	`by_id` text,
	`from_state` text,
	`to_state` text NOT NULL,
	`limits` text,
	`reason` text,
	FOREIGN KEY (`clearance_id`) REFERENCES `clearances`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`by_id`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `clearance_moves_clearance` ON `clearance_moves` (`clearance_id`,`at`);--> statement-breakpoint
CREATE TABLE `clearances` (
	`id` text PRIMARY KEY NOT NULL,
	`episode_id` text NOT NULL,
	`operation_id` text,
	`thread_id` text,
	`kind` text NOT NULL,
	`state` text NOT NULL,
	`question` text NOT NULL,
	`asked_by` text NOT NULL,
	`asked_at` integer NOT NULL,
	`evidence` text NOT NULL,
	`decided_by` text,
	`decided_at` integer,
	`limits` text,
	`review_on` text,
	`note` text,
	`reason` text,
	FOREIGN KEY (`episode_id`) REFERENCES `episodes`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`operation_id`) REFERENCES `operations`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`thread_id`) REFERENCES `threads`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`asked_by`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`decided_by`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `clearances_episode` ON `clearances` (`episode_id`,`kind`);--> statement-breakpoint
CREATE UNIQUE INDEX `clearances_one_open` ON `clearances` (`episode_id`,`kind`) WHERE state in ('asked', 'given', 'given-with-limits', 'on-hold');--> statement-breakpoint
CREATE TABLE `episodes` (
	`id` text PRIMARY KEY NOT NULL,
	`patient_id` text NOT NULL,
	`unit_id` text NOT NULL,
	`bed` text,
	`phase` text DEFAULT 'inpatient' NOT NULL,
	`level` integer DEFAULT 1 NOT NULL,
	`beta_blocked` integer,
	`rhythm` text,
	`surgeon_id` text,
	`created_at` integer NOT NULL,
	`closed_at` integer,
	FOREIGN KEY (`patient_id`) REFERENCES `patients`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`unit_id`) REFERENCES `units`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`surgeon_id`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `episodes_unit` ON `episodes` (`unit_id`,`closed_at`);--> statement-breakpoint
CREATE INDEX `episodes_patient` ON `episodes` (`patient_id`);--> statement-breakpoint
CREATE UNIQUE INDEX `episodes_bed_in_use` ON `episodes` (`unit_id`,`bed`) WHERE closed_at is null and bed is not null;--> statement-breakpoint
CREATE TABLE `operations` (
	`id` text PRIMARY KEY NOT NULL,
	`episode_id` text NOT NULL,
	`procedure` text NOT NULL,
	`approach` text NOT NULL,
	`operated_at` integer NOT NULL,
	`surgeon_id` text,
	`created_at` integer NOT NULL,
	FOREIGN KEY (`episode_id`) REFERENCES `episodes`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`surgeon_id`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `operations_episode` ON `operations` (`episode_id`,`operated_at`);--> statement-breakpoint
CREATE TABLE `patients` (
	`id` text PRIMARY KEY NOT NULL,
	`name` text NOT NULL,
	`mrn` text NOT NULL,
	`birth_date` text NOT NULL,
	`sex` text NOT NULL,
	`phone` text,
	`language` text DEFAULT 'en' NOT NULL,
	`zone` text NOT NULL,
	`sms_consent` integer DEFAULT false NOT NULL,
	`sms_opted_out_at` integer,
	`created_at` integer NOT NULL
);
--> statement-breakpoint
CREATE UNIQUE INDEX `patients_mrn_unique` ON `patients` (`mrn`);--> statement-breakpoint
CREATE INDEX `patients_phone` ON `patients` (`phone`);--> statement-breakpoint
CREATE TABLE `placements` (
	`id` text PRIMARY KEY NOT NULL,
	`episode_id` text NOT NULL,
	`unit_id` text NOT NULL,
	`bed` text,
	`from_at` integer NOT NULL,
	`until_at` integer,
	FOREIGN KEY (`episode_id`) REFERENCES `episodes`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`unit_id`) REFERENCES `units`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `placements_episode` ON `placements` (`episode_id`,`from_at`);--> statement-breakpoint
CREATE TABLE `escalation_links` (
	`id` text PRIMARY KEY NOT NULL,
	`escalation_id` text NOT NULL,
	`user_id` text NOT NULL,
	`token_hash` text NOT NULL,
	`created_at` integer NOT NULL,
	`expires_at` integer NOT NULL,
	`used_at` integer,
	FOREIGN KEY (`escalation_id`) REFERENCES `escalations`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`user_id`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `escalation_links_token_hash_unique` ON `escalation_links` (`token_hash`);--> statement-breakpoint
CREATE TABLE `escalation_moves` (
	`id` text PRIMARY KEY NOT NULL,
	`escalation_id` text NOT NULL,
	`at` integer NOT NULL,
	`by_id` text,
	`kind` text NOT NULL,
	`detail` text,
	FOREIGN KEY (`escalation_id`) REFERENCES `escalations`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`by_id`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `escalation_moves_escalation` ON `escalation_moves` (`escalation_id`,`at`);--> statement-breakpoint
CREATE TABLE `escalation_steps` (
	`id` text PRIMARY KEY NOT NULL,
	`escalation_id` text NOT NULL,
	`step` integer NOT NULL,
	`post` text NOT NULL,
	`due_at` integer NOT NULL,
	`at` integer NOT NULL,
	`user_id` text,
	`channel` text,
	`message_id` text,
	FOREIGN KEY (`escalation_id`) REFERENCES `escalations`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`user_id`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `escalation_steps_escalation` ON `escalation_steps` (`escalation_id`,`step`);--> statement-breakpoint
CREATE TABLE `escalations` (
	`id` text PRIMARY KEY NOT NULL,
	`episode_id` text NOT NULL,
	`unit_id` text NOT NULL,
	`grade` text NOT NULL,
	`state` text NOT NULL,
	`situation` text NOT NULL,
	`background` text NOT NULL,
	`assessment` text NOT NULL,
	`request` text NOT NULL,
	`needed_by` integer,
	`told_in_person` text,
	`session_id` text,
	`thread_id` text,
	`raised_by` text NOT NULL,
	`raised_at` integer NOT NULL,
	`taken_by` text,
	`taken_at` integer,
	`eta_minutes` integer,
	`arrived_at` integer,
	`pass_to` text,
	`pass_reason` text,
	`ended_by` text,
	`ended_at` integer,
	`outcome` text,
	`note` text,
	`informed` text,
	`recheck_due_at` integer,
	`recheck_done_at` integer,
	`next_step` integer,
	`next_step_at` integer,
	`chain_started_at` integer NOT NULL,
	FOREIGN KEY (`episode_id`) REFERENCES `episodes`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`unit_id`) REFERENCES `units`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`told_in_person`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`session_id`) REFERENCES `bedside_sessions`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`thread_id`) REFERENCES `threads`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`raised_by`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`taken_by`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`pass_to`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`ended_by`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `escalations_episode` ON `escalations` (`episode_id`,`raised_at`);--> statement-breakpoint
CREATE INDEX `escalations_timer` ON `escalations` (`next_step_at`);--> statement-breakpoint
CREATE INDEX `escalations_state` ON `escalations` (`state`,`unit_id`);--> statement-breakpoint
CREATE UNIQUE INDEX `escalations_one_untaken` ON `escalations` (`episode_id`) WHERE state = 'raised';--> statement-breakpoint
CREATE TABLE `inbound_messages` (
	`id` text PRIMARY KEY NOT NULL,
	`provider_id` text NOT NULL,
	`from_number` text NOT NULL,
	`body` text NOT NULL,
	`at` integer NOT NULL,
	`patient_id` text,
	`user_id` text,
	`understood_as` text NOT NULL,
	`visit_id` text,
	`handled_at` integer,
	`handled_by` text,
	FOREIGN KEY (`patient_id`) REFERENCES `patients`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`user_id`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`visit_id`) REFERENCES `visits`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`handled_by`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `inbound_messages_provider_id_unique` ON `inbound_messages` (`provider_id`);--> statement-breakpoint
CREATE TABLE `outbox` (
	`id` text PRIMARY KEY NOT NULL,
	`kind` text NOT NULL,
	`channel` text NOT NULL,
	`cause_key` text NOT NULL,
	`user_id` text,
	`patient_id` text,
	`address` text,
	`subject` text,
	`body` text NOT NULL,
	`link_id` text,
	`ref_kind` text NOT NULL,
	`ref_id` text NOT NULL,
	`state` text NOT NULL,
	`state_reason` text,
	`attempts` integer DEFAULT 0 NOT NULL,
	`created_at` integer NOT NULL,
	`next_at` integer NOT NULL,
	`expires_at` integer NOT NULL,
	`lease_owner` text,
	`lease_until` integer,
	`sent_at` integer,
	`provider_id` text,
	`handled_at` integer,
	`handled_by` text,
	FOREIGN KEY (`user_id`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`patient_id`) REFERENCES `patients`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`handled_by`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `outbox_cause_key_unique` ON `outbox` (`cause_key`);--> statement-breakpoint
CREATE INDEX `outbox_due` ON `outbox` (`state`,`next_at`);--> statement-breakpoint
CREATE INDEX `outbox_ref` ON `outbox` (`ref_kind`,`ref_id`);--> statement-breakpoint
CREATE INDEX `outbox_provider` ON `outbox` (`provider_id`);--> statement-breakpoint
CREATE TABLE `outbox_attempts` (
	`id` text PRIMARY KEY NOT NULL,
	`message_id` text NOT NULL,
	`number` integer NOT NULL,
	`started_at` integer NOT NULL,
	`ended_at` integer NOT NULL,
	`outcome` text NOT NULL,
	`code` text,
	`provider_id` text,
	FOREIGN KEY (`message_id`) REFERENCES `outbox`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `outbox_attempts_message` ON `outbox_attempts` (`message_id`,`number`);--> statement-breakpoint
CREATE TABLE `sms_statuses` (
	`id` text PRIMARY KEY NOT NULL,
	`provider_id` text NOT NULL,
	`status` text NOT NULL,
	`error_code` text,
	`at` integer NOT NULL
);
--> statement-breakpoint
CREATE UNIQUE INDEX `sms_statuses_once` ON `sms_statuses` (`provider_id`,`status`);--> statement-breakpoint
CREATE TABLE `entries` (
	`id` text PRIMARY KEY NOT NULL,
	`thread_id` text NOT NULL,
	`seq` integer NOT NULL,
	`at` integer NOT NULL,
	`author_id` text,
	`strand` text NOT NULL,
	`kind` text NOT NULL,
	`body` text NOT NULL,
	`ref_kind` text,
	`ref_id` text,
	`mentions` text DEFAULT '[]' NOT NULL,
	FOREIGN KEY (`thread_id`) REFERENCES `threads`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`author_id`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `entries_thread_seq` ON `entries` (`thread_id`,`seq`);--> statement-breakpoint
CREATE INDEX `entries_ref` ON `entries` (`ref_kind`,`ref_id`);--> statement-breakpoint
CREATE TABLE `referrals` (
	`id` text PRIMARY KEY NOT NULL,
	`episode_id` text NOT NULL,
	`service` text NOT NULL,
	`priority` text NOT NULL,
	`question` text NOT NULL,
	`state` text NOT NULL,
	`asked_by` text NOT NULL,
	`asked_at` integer NOT NULL,
	`decided_by` text,
	`decided_at` integer,
	`reason` text,
	FOREIGN KEY (`episode_id`) REFERENCES `episodes`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`asked_by`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`decided_by`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `referrals_episode` ON `referrals` (`episode_id`);--> statement-breakpoint
CREATE INDEX `referrals_state` ON `referrals` (`state`,`service`);--> statement-breakpoint
CREATE TABLE `threads` (
	`id` text PRIMARY KEY NOT NULL,
	`referral_id` text NOT NULL,
	`episode_id` text NOT NULL,
	`last_seq` integer DEFAULT 0 NOT NULL,
	FOREIGN KEY (`referral_id`) REFERENCES `referrals`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`episode_id`) REFERENCES `episodes`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `threads_referral_id_unique` ON `threads` (`referral_id`);--> statement-breakpoint
CREATE INDEX `threads_episode` ON `threads` (`episode_id`);--> statement-breakpoint
CREATE TABLE `audit` (
	`seq` integer PRIMARY KEY NOT NULL,
	`at` integer NOT NULL,
	`actor_kind` text NOT NULL,
	`actor_id` text NOT NULL,
	`address` text,
	`action` text NOT NULL,
	`object_kind` text NOT NULL,
	`object_id` text NOT NULL,
	`episode_id` text,
	`outcome` text NOT NULL,
	`detail` text,
	`prev` text NOT NULL,
	`hash` text NOT NULL,
	CONSTRAINT "audit_hash_length" CHECK(length(hash) = 64)
);
--> statement-breakpoint
CREATE INDEX `audit_episode` ON `audit` (`episode_id`,`at`);--> statement-breakpoint
CREATE INDEX `audit_actor` ON `audit` (`actor_id`,`at`);--> statement-breakpoint
CREATE TABLE `cover_shifts` (
	`id` text PRIMARY KEY NOT NULL,
	`unit_id` text NOT NULL,
	`post` text NOT NULL,
	`user_id` text NOT NULL,
	`starts_at` integer NOT NULL,
	`ends_at` integer NOT NULL,
	FOREIGN KEY (`unit_id`) REFERENCES `units`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`user_id`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `cover_shifts_now` ON `cover_shifts` (`unit_id`,`post`,`starts_at`);--> statement-breakpoint
CREATE TABLE `idempotency_keys` (
	`actor_id` text NOT NULL,
	`path` text NOT NULL,
	`key` text NOT NULL,
	`digest` text NOT NULL,
	`answer` text NOT NULL,
	`at` integer NOT NULL,
	PRIMARY KEY(`actor_id`, `path`, `key`)
);
--> statement-breakpoint
CREATE INDEX `idempotency_keys_at` ON `idempotency_keys` (`at`);--> statement-breakpoint
CREATE TABLE `live_events` (
	`id` integer PRIMARY KEY AUTOINCREMENT NOT NULL,
	`at` integer NOT NULL,
	`topic` text NOT NULL,
	`kind` text NOT NULL,
	`subject_id` text NOT NULL,
	`episode_id` text,
	`user_id` text
);
--> statement-breakpoint
CREATE INDEX `live_events_at` ON `live_events` (`at`);--> statement-breakpoint
CREATE TABLE `settings` (
	`key` text PRIMARY KEY NOT NULL,
	`value` text NOT NULL,
	`changed_at` integer NOT NULL,
	`changed_by` text,
	FOREIGN KEY (`changed_by`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE TABLE `reminders` (
	`id` text PRIMARY KEY NOT NULL,
	`visit_id` text NOT NULL,
	`due_at` integer NOT NULL,
	`message_id` text NOT NULL,
	FOREIGN KEY (`visit_id`) REFERENCES `visits`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `reminders_visit` ON `reminders` (`visit_id`);--> statement-breakpoint
CREATE TABLE `visits` (
	`id` text PRIMARY KEY NOT NULL,
	`episode_id` text NOT NULL,
	`series_id` text,
	`local_date` text NOT NULL,
	`local_time` text NOT NULL,
	`zone` text NOT NULL,
	`starts_at` integer NOT NULL,
	`minutes` integer NOT NULL,
	`unit_id` text NOT NULL,
	`place` text NOT NULL,
	`state` text NOT NULL,
	`reason` text,
	`booked_by` text NOT NULL,
	`booked_at` integer NOT NULL,
	`decided_at` integer,
	`patient_cancelled_at` integer,
	`followed_up_at` integer,
	`followed_up_by` text,
	FOREIGN KEY (`episode_id`) REFERENCES `episodes`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`unit_id`) REFERENCES `units`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`booked_by`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`followed_up_by`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `visits_start` ON `visits` (`starts_at`);--> statement-breakpoint
CREATE INDEX `visits_episode` ON `visits` (`episode_id`,`starts_at`);