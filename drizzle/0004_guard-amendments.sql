-- What a record said before it was amended is append-only, like every other history.
CREATE TRIGGER patient_amendments_no_update BEFORE UPDATE ON patient_amendments BEGIN SELECT RAISE(ABORT, 'patient_amendments is append-only'); END;--> statement-breakpoint
CREATE TRIGGER patient_amendments_no_delete BEFORE DELETE ON patient_amendments BEGIN SELECT RAISE(ABORT, 'patient_amendments is append-only'); END;--> statement-breakpoint
-- Streams that resume after the update still hear what happened before it.
UPDATE live_events SET unit_id = (SELECT unit_id FROM episodes WHERE episodes.id = live_events.episode_id) WHERE unit_id IS NULL;--> statement-breakpoint
-- Hospital numbers and beds are stored in capitals without spaces; one whose new form is taken stays as it is.
UPDATE OR IGNORE patients SET mrn = upper(replace(mrn, ' ', ''));--> statement-breakpoint
UPDATE OR IGNORE episodes SET bed = upper(replace(bed, ' ', '')) WHERE bed IS NOT NULL;
