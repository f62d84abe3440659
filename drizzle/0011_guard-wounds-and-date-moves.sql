-- What was noted of a wound is noted again when it changes, never changed.
CREATE TRIGGER wound_notes_no_update BEFORE UPDATE ON wound_notes BEGIN SELECT RAISE(ABORT, 'wound_notes is append-only'); END;--> statement-breakpoint
CREATE TRIGGER wound_notes_no_delete BEFORE DELETE ON wound_notes BEGIN SELECT RAISE(ABORT, 'wound_notes is append-only'); END;--> statement-breakpoint
-- Earlier moves did not say until when a clearance was given; replayed without, it would never have ended.
DROP TRIGGER clearance_moves_no_update;--> statement-breakpoint
UPDATE clearance_moves SET review_on = (SELECT review_on FROM clearances WHERE clearances.id = clearance_moves.clearance_id) WHERE to_state IN ('given', 'given-with-limits', 'on-hold');--> statement-breakpoint
CREATE TRIGGER clearance_moves_no_update BEFORE UPDATE ON clearance_moves BEGIN SELECT RAISE(ABORT, 'clearance_moves is append-only'); END;
