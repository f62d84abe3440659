CREATE TABLE `prescribed_ranges` (
	`id` text PRIMARY KEY NOT NULL,
	`episode_id` text NOT NULL,
	`version` integer NOT NULL,
	`hr_min` real,
	`hr_max` real,
	`rpe_min` real,
	`rpe_max` real,
	`method` text,
	`note` text,
	`prescribed_by` text NOT NULL,
	`prescribed_at` integer NOT NULL,
	FOREIGN KEY (`episode_id`) REFERENCES `episodes`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`prescribed_by`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE UNIQUE INDEX `prescribed_ranges_version` ON `prescribed_ranges` (`episode_id`,`version`);