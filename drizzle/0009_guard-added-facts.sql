-- What a further caller said is append-only, like every other history.
CREATE TRIGGER escalation_facts_no_update BEFORE UPDATE ON escalation_facts BEGIN SELECT RAISE(ABORT, 'escalation_facts is append-only'); END;--> statement-breakpoint
CREATE TRIGGER escalation_facts_no_delete BEFORE DELETE ON escalation_facts BEGIN SELECT RAISE(ABORT, 'escalation_facts is append-only'); END;
