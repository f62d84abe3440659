-- What was corrected keeps what it said before, and what was said about a session is never taken back.
CREATE TRIGGER operation_amendments_no_update BEFORE UPDATE ON operation_amendments BEGIN SELECT RAISE(ABORT, 'operation_amendments is append-only'); END;--> statement-breakpoint
CREATE TRIGGER operation_amendments_no_delete BEFORE DELETE ON operation_amendments BEGIN SELECT RAISE(ABORT, 'operation_amendments is append-only'); END;--> statement-breakpoint
CREATE TRIGGER session_amendments_no_update BEFORE UPDATE ON session_amendments BEGIN SELECT RAISE(ABORT, 'session_amendments is append-only'); END;--> statement-breakpoint
CREATE TRIGGER session_amendments_no_delete BEFORE DELETE ON session_amendments BEGIN SELECT RAISE(ABORT, 'session_amendments is append-only'); END;
