-- The triggers went with the table that was made anew: what a record said before stays append-only.
CREATE TRIGGER patient_amendments_no_update BEFORE UPDATE ON patient_amendments BEGIN SELECT RAISE(ABORT, 'patient_amendments is append-only'); END;--> statement-breakpoint
CREATE TRIGGER patient_amendments_no_delete BEFORE DELETE ON patient_amendments BEGIN SELECT RAISE(ABORT, 'patient_amendments is append-only'); END;
