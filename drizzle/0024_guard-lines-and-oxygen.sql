-- A line is noted in and out once each: what was noted stays as it was, and one that is put in again is another row.
CREATE TRIGGER lines_only_out BEFORE UPDATE ON lines WHEN old.out_at IS NOT NULL OR new.out_at IS NULL OR new.out_by IS NULL OR new.id <> old.id OR new.episode_id <> old.episode_id OR new.kind <> old.kind OR new.in_by <> old.in_by OR new.in_at <> old.in_at BEGIN SELECT RAISE(ABORT, 'lines are noted in and out once'); END;--> statement-breakpoint
CREATE TRIGGER lines_stay BEFORE DELETE ON lines BEGIN SELECT RAISE(ABORT, 'lines are noted in and out once'); END;--> statement-breakpoint
CREATE TRIGGER oxygen_notes_no_update BEFORE UPDATE ON oxygen_notes BEGIN SELECT RAISE(ABORT, 'oxygen_notes is append-only'); END;--> statement-breakpoint
CREATE TRIGGER oxygen_notes_no_delete BEFORE DELETE ON oxygen_notes BEGIN SELECT RAISE(ABORT, 'oxygen_notes is append-only'); END;
