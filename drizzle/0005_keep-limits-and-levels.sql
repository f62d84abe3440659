CREATE TABLE `level_decisions` (
	`id` text PRIMARY KEY NOT NULL,
	`episode_id` text NOT NULL,
	`from_level` integer NOT NULL,
	`to_level` integer NOT NULL,
	`suggestion` text,
	`session_id` text,
	`reason` text,
	`decided_by` text NOT NULL,
	`decided_at` integer NOT NULL,
	`signed_by` text,
	FOREIGN KEY (`episode_id`) REFERENCES `episodes`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`session_id`) REFERENCES `bedside_sessions`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`decided_by`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`signed_by`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `level_decisions_episode` ON `level_decisions` (`episode_id`,`decided_at`);--> statement-breakpoint
CREATE TABLE `sign_offs` (
	`id` text PRIMARY KEY NOT NULL,
	`episode_id` text NOT NULL,
	`kind` text NOT NULL,
	`state` text NOT NULL,
	`session_id` text,
	`to_level` integer,
	`words` text NOT NULL,
	`asked_by` text NOT NULL,
	`asked_at` integer NOT NULL,
	`decided_by` text,
	`decided_at` integer,
	`reason` text,
	FOREIGN KEY (`episode_id`) REFERENCES `episodes`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`session_id`) REFERENCES `bedside_sessions`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`asked_by`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`decided_by`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `sign_offs_episode` ON `sign_offs` (`episode_id`,`state`);--> statement-breakpoint
CREATE TABLE `patient_limits` (
	`id` text PRIMARY KEY NOT NULL,
	`episode_id` text NOT NULL,
	`version` integer NOT NULL,
	`limit_key` text NOT NULL,
	`value` real NOT NULL,
	`reason` text NOT NULL,
	`until_on` text NOT NULL,
	`set_by` text NOT NULL,
	`set_at` integer NOT NULL,
	`ended_by` text,
	`ended_at` integer,
	FOREIGN KEY (`episode_id`) REFERENCES `episodes`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`set_by`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`ended_by`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `patient_limits_version` ON `patient_limits` (`episode_id`,`version`);--> statement-breakpoint
CREATE INDEX `patient_limits_episode` ON `patient_limits` (`episode_id`,`set_at`);--> statement-breakpoint
CREATE TABLE `unit_activity_changes` (
	`id` text PRIMARY KEY NOT NULL,
	`unit_id` text NOT NULL,
	`version` integer NOT NULL,
	`activity` text NOT NULL,
	`lines` text,
	`agreed_by` text NOT NULL,
	`agreed_on` text NOT NULL,
	`changed_by` text NOT NULL,
	`changed_at` integer NOT NULL,
	FOREIGN KEY (`unit_id`) REFERENCES `units`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`changed_by`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `unit_activity_changes_version` ON `unit_activity_changes` (`unit_id`,`version`);--> statement-breakpoint
CREATE TABLE `unit_limit_changes` (
	`id` text PRIMARY KEY NOT NULL,
	`unit_id` text NOT NULL,
	`version` integer NOT NULL,
	`limit_set` text NOT NULL,
	`limit_key` text,
	`value` real,
	`agreed_by` text NOT NULL,
	`agreed_on` text NOT NULL,
	`changed_by` text NOT NULL,
	`changed_at` integer NOT NULL,
	FOREIGN KEY (`unit_id`) REFERENCES `units`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`changed_by`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `unit_limit_changes_version` ON `unit_limit_changes` (`unit_id`,`version`);--> statement-breakpoint
ALTER TABLE `users` ADD `senior` integer DEFAULT false NOT NULL;--> statement-breakpoint
ALTER TABLE `findings` ADD `limit_set` text;--> statement-breakpoint
ALTER TABLE `findings` ADD `limit_version` text;--> statement-breakpoint
ALTER TABLE `episodes` ADD `level_reached` integer DEFAULT 1 NOT NULL;