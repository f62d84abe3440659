-- Which range judged a session is read years later: the database itself refuses to change it.
CREATE TRIGGER prescribed_ranges_no_update BEFORE UPDATE ON prescribed_ranges BEGIN SELECT RAISE(ABORT, 'prescribed_ranges is append-only'); END;--> statement-breakpoint
CREATE TRIGGER prescribed_ranges_no_delete BEFORE DELETE ON prescribed_ranges BEGIN SELECT RAISE(ABORT, 'prescribed_ranges is append-only'); END;
