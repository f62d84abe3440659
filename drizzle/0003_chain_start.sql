ALTER TABLE `escalations` ADD `chain_started_at` integer NOT NULL;--> statement-breakpoint
ALTER TABLE `sms_statuses` ADD `error_code` text;