CREATE TABLE `mentions` (
	`id` text PRIMARY KEY NOT NULL,
	`entry_id` text NOT NULL,
	`user_id` text NOT NULL,
	`seen_at` integer,
	FOREIGN KEY (`entry_id`) REFERENCES `entries`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`user_id`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `mentions_once` ON `mentions` (`entry_id`,`user_id`);--> statement-breakpoint
CREATE INDEX `mentions_open` ON `mentions` (`user_id`,`seen_at`);