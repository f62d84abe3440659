ALTER TABLE `inbound_messages` ADD `visit_id` text REFERENCES visits(id);--> statement-breakpoint
ALTER TABLE `outbox` ADD `handled_at` integer;--> statement-breakpoint
ALTER TABLE `outbox` ADD `handled_by` text REFERENCES users(id);--> statement-breakpoint
ALTER TABLE `visits` ADD `patient_cancelled_at` integer;--> statement-breakpoint
ALTER TABLE `visits` ADD `followed_up_at` integer;--> statement-breakpoint
ALTER TABLE `visits` ADD `followed_up_by` text REFERENCES users(id);