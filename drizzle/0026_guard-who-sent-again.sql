-- Who had a message sent again, and why, stays as it was said.
CREATE TRIGGER outbox_resends_no_update BEFORE UPDATE ON outbox_resends BEGIN SELECT RAISE(ABORT, 'outbox_resends is append-only'); END;--> statement-breakpoint
CREATE TRIGGER outbox_resends_no_delete BEFORE DELETE ON outbox_resends BEGIN SELECT RAISE(ABORT, 'outbox_resends is append-only'); END;
