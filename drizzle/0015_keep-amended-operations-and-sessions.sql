CREATE TABLE `session_amendments` (
	`id` text PRIMARY KEY NOT NULL,
	`session_id` text NOT NULL,
	`kind` text NOT NULL,
	`body` text NOT NULL,
	`by_id` text NOT NULL,
	`at` integer NOT NULL,
	FOREIGN KEY (`session_id`) REFERENCES `bedside_sessions`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`by_id`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `session_amendments_session` ON `session_amendments` (`session_id`,`at`);--> statement-breakpoint
CREATE TABLE `operation_amendments` (
	`id` text PRIMARY KEY NOT NULL,
	`operation_id` text NOT NULL,
	`at` integer NOT NULL,
	`by_id` text NOT NULL,
	`field` text NOT NULL,
	`before` text,
	`after` text,
	FOREIGN KEY (`operation_id`) REFERENCES `operations`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`by_id`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `operation_amendments_operation` ON `operation_amendments` (`operation_id`,`at`);