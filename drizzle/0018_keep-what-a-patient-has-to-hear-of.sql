ALTER TABLE `visits` ADD `changed_at` integer;--> statement-breakpoint
ALTER TABLE `visits` ADD `changed_from` integer;--> statement-breakpoint
ALTER TABLE `visits` ADD `told_at` integer;--> statement-breakpoint
ALTER TABLE `visits` ADD `told_by` text REFERENCES users(id);