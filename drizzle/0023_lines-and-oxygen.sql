CREATE TABLE `lines` (
	`id` text PRIMARY KEY NOT NULL,
	`episode_id` text NOT NULL,
	`kind` text NOT NULL,
	`in_by` text NOT NULL,
	`in_at` integer NOT NULL,
	`out_by` text,
	`out_at` integer,
	FOREIGN KEY (`episode_id`) REFERENCES `episodes`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`in_by`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`out_by`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `lines_episode` ON `lines` (`episode_id`,`in_at`);--> statement-breakpoint
CREATE UNIQUE INDEX `lines_one_in` ON `lines` (`episode_id`,`kind`) WHERE out_at is null;--> statement-breakpoint
CREATE TABLE `oxygen_notes` (
	`id` text PRIMARY KEY NOT NULL,
	`episode_id` text NOT NULL,
	`lpm` real NOT NULL,
	`noted_by` text NOT NULL,
	`noted_at` integer NOT NULL,
	FOREIGN KEY (`episode_id`) REFERENCES `episodes`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`noted_by`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `oxygen_notes_episode` ON `oxygen_notes` (`episode_id`,`noted_at`);