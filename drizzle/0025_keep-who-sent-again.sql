CREATE TABLE `outbox_resends` (
	`id` text PRIMARY KEY NOT NULL,
	`message_id` text NOT NULL,
	`at` integer NOT NULL,
	`by_id` text NOT NULL,
	`reason` text NOT NULL,
	FOREIGN KEY (`message_id`) REFERENCES `outbox`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`by_id`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `outbox_resends_message` ON `outbox_resends` (`message_id`,`at`);