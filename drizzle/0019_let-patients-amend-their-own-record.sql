PRAGMA foreign_keys=OFF;--> statement-breakpoint
CREATE TABLE `__new_patient_amendments` (
	`id` text PRIMARY KEY NOT NULL,
	`patient_id` text NOT NULL,
	`at` integer NOT NULL,
	`by_id` text,
	`field` text NOT NULL,
	`before` text,
	`after` text,
	FOREIGN KEY (`patient_id`) REFERENCES `patients`(`id`) ON UPDATE no action ON DELETE no action,
	FOREIGN KEY (`by_id`) REFERENCES `users`(`id`) ON UPDATE no action ON DELETE no action
);
--> statement-breakpoint
INSERT INTO `__new_patient_amendments`("id", "patient_id", "at", "by_id", "field", "before", "after") SELECT "id", "patient_id", "at", "by_id", "field", "before", "after" FROM `patient_amendments`;--> statement-breakpoint
DROP TABLE `patient_amendments`;--> statement-breakpoint
ALTER TABLE `__new_patient_amendments` RENAME TO `patient_amendments`;--> statement-breakpoint
PRAGMA foreign_keys=ON;--> statement-breakpoint
CREATE INDEX `patient_amendments_patient` ON `patient_amendments` (`patient_id`,`at`);