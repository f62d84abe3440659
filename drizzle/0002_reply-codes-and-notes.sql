ALTER TABLE `escalations` ADD `reply_code` text;--> statement-breakpoint
CREATE UNIQUE INDEX `escalations_reply_code` ON `escalations` (`reply_code`) WHERE state in ('raised', 'taken');--> statement-breakpoint
ALTER TABLE `inbound_messages` ADD `handled_note` text;