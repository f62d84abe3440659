CREATE TABLE `patient_amendments` (
	`id` text PRIMARY KEY NOT NULL,
	`patient_id` text NOT NULL,
	`at` integer NOT NULL,
	`by_id` text NOT NULL,
	`field` text NOT NULL,
	`before` text,
	`after` text,
	FOREIGN KEY (`patient_id`) REFERENCES `patients`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`by_id`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
CREATE INDEX `patient_amendments_patient` ON `patient_amendments` (`patient_id`,`at`);--> statement-breakpoint
ALTER TABLE `episodes` ADD `closed_for` text;--> statement-breakpoint
ALTER TABLE `live_events` ADD `unit_id` text;