CREATE TABLE `closed_days` (
	`id` text PRIMARY KEY NOT NULL,
	`date` text NOT NULL,
	`name` text NOT NULL,
	`added_by` text NOT NULL,
	`added_at` integer NOT NULL,
	`removed_at` integer,
	`removed_by` text,
	FOREIGN KEY (`added_by`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`removed_by`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `closed_days_date` ON `closed_days` (`date`) WHERE removed_at is null;--> statement-breakpoint
CREATE TABLE `patient_links` (
	`id` text PRIMARY KEY NOT NULL,
	`token_hash` text NOT NULL,
	`episode_id` text NOT NULL,
	`way` text NOT NULL,
	`created_by` text NOT NULL,
	`created_at` integer NOT NULL,
	`expires_at` integer NOT NULL,
	`revoked_at` integer,
	`revoked_by` text,
	FOREIGN KEY (`episode_id`) REFERENCES `episodes`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`created_by`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`revoked_by`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `patient_links_token_hash_unique` ON `patient_links` (`token_hash`);--> statement-breakpoint
CREATE INDEX `patient_links_episode` ON `patient_links` (`episode_id`,`created_at`);--> statement-breakpoint
ALTER TABLE `patients` ADD `email` text;--> statement-breakpoint
ALTER TABLE `patients` ADD `mail_consent` integer DEFAULT false NOT NULL;--> statement-breakpoint
ALTER TABLE `outbox` ADD `calendar` text;--> statement-breakpoint
ALTER TABLE `reminders` ADD `sequence` integer DEFAULT 0 NOT NULL;--> statement-breakpoint
ALTER TABLE `visits` ADD `sequence` integer DEFAULT 0 NOT NULL;