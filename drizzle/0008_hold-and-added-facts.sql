CREATE TABLE `escalation_facts` (
	`id` text PRIMARY KEY NOT NULL,
	`escalation_id` text NOT NULL,
	`by_id` text NOT NULL,
	`at` integer NOT NULL,
	`grade` text NOT NULL,
	`raised_grade` integer NOT NULL,
	`situation` text NOT NULL,
	`background` text NOT NULL,
	`assessment` text NOT NULL,
	`request` text NOT NULL,
	`needed_by` integer,
	`told_in_person` text,
	`session_id` text,
	`thread_id` text,
	FOREIGN KEY (`escalation_id`) REFERENCES `escalations`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`by_id`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`told_in_person`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`session_id`) REFERENCES `bedside_sessions`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`thread_id`) REFERENCES `threads`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `escalation_facts_escalation` ON `escalation_facts` (`escalation_id`,`at`);--> statement-breakpoint
ALTER TABLE `escalations` ADD `eta_given_at` integer;--> statement-breakpoint
ALTER TABLE `escalations` ADD `ask_holder_at` integer;--> statement-breakpoint
ALTER TABLE `escalations` ADD `holder_asked_at` integer;--> statement-breakpoint
CREATE INDEX `escalations_ask` ON `escalations` (`ask_holder_at`);