-- What a limit was, and who decided on a level, is read years later: the database itself refuses to change it.
CREATE TRIGGER unit_limit_changes_no_update BEFORE UPDATE ON unit_limit_changes BEGIN SELECT RAISE(ABORT, 'unit_limit_changes is append-only'); END;--> statement-breakpoint
CREATE TRIGGER unit_limit_changes_no_delete BEFORE DELETE ON unit_limit_changes BEGIN SELECT RAISE(ABORT, 'unit_limit_changes is append-only'); END;--> statement-breakpoint
CREATE TRIGGER unit_activity_changes_no_update BEFORE UPDATE ON unit_activity_changes BEGIN SELECT RAISE(ABORT, 'unit_activity_changes is append-only'); END;--> statement-breakpoint
CREATE TRIGGER unit_activity_changes_no_delete BEFORE DELETE ON unit_activity_changes BEGIN SELECT RAISE(ABORT, 'unit_activity_changes is append-only'); END;--> statement-breakpoint
CREATE TRIGGER level_decisions_no_update BEFORE UPDATE ON level_decisions BEGIN SELECT RAISE(ABORT, 'level_decisions is append-only'); END;--> statement-breakpoint
CREATE TRIGGER level_decisions_no_delete BEFORE DELETE ON level_decisions BEGIN SELECT RAISE(ABORT, 'level_decisions is append-only'); END;--> statement-breakpoint
-- A patient's limit may be ended, and nothing else about it may change.
CREATE TRIGGER patient_limits_only_ended BEFORE UPDATE OF id, episode_id, version, limit_key, value, reason, until_on, set_by, set_at ON patient_limits BEGIN SELECT RAISE(ABORT, 'patient_limits is append-only'); END;--> statement-breakpoint
CREATE TRIGGER patient_limits_no_delete BEFORE DELETE ON patient_limits BEGIN SELECT RAISE(ABORT, 'patient_limits is append-only'); END;--> statement-breakpoint
-- Nobody lies below a level that was not reached.
UPDATE episodes SET level_reached = level WHERE level_reached < level;
