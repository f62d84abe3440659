CREATE TABLE `wound_notes` (
	`id` text PRIMARY KEY NOT NULL,
	`episode_id` text NOT NULL,
	`wound` text,
	`sternum` text,
	`note` text,
	`noted_by` text NOT NULL,
	`noted_at` integer NOT NULL,
	FOREIGN KEY (`episode_id`) REFERENCES `episodes`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`noted_by`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `wound_notes_episode` ON `wound_notes` (`episode_id`,`noted_at`);--> statement-breakpoint
CREATE TABLE `clearance_questions` (
	`id` text PRIMARY KEY NOT NULL,
	`clearance_id` text NOT NULL,
	`question` text NOT NULL,
	`asked_by` text NOT NULL,
	`asked_at` integer NOT NULL,
	`answer` text,
	`answered_by` text,
	`answered_at` integer,
	FOREIGN KEY (`clearance_id`) REFERENCES `clearances`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`asked_by`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`answered_by`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `clearance_questions_clearance` ON `clearance_questions` (`clearance_id`,`asked_at`);--> statement-breakpoint
CREATE UNIQUE INDEX `clearance_questions_one_open` ON `clearance_questions` (`clearance_id`) WHERE answered_at is null;--> statement-breakpoint
CREATE TABLE `deviations` (
	`id` text PRIMARY KEY NOT NULL,
	`episode_id` text NOT NULL,
	`session_id` text NOT NULL,
	`kind` text NOT NULL,
	`stood` text,
	`reason` text NOT NULL,
	`thread_id` text,
	`recorded_by` text NOT NULL,
	`recorded_at` integer NOT NULL,
	`seen_by` text,
	`seen_at` integer,
	FOREIGN KEY (`episode_id`) REFERENCES `episodes`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`session_id`) REFERENCES `bedside_sessions`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`thread_id`) REFERENCES `threads`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`recorded_by`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`seen_by`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `deviations_episode` ON `deviations` (`episode_id`,`seen_at`);--> statement-breakpoint
CREATE INDEX `deviations_session` ON `deviations` (`session_id`);--> statement-breakpoint
ALTER TABLE `clearance_moves` ADD `review_on` text;--> statement-breakpoint
ALTER TABLE `clearance_moves` ADD `evidence` text;