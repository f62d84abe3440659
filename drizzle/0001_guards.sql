-- Records are amended, never changed: the database itself refuses to update or delete what is append-only.
CREATE TRIGGER audit_no_update BEFORE UPDATE ON audit BEGIN SELECT RAISE(ABORT, 'audit is append-only'); END;--> statement-breakpoint
CREATE TRIGGER audit_no_delete BEFORE DELETE ON audit BEGIN SELECT RAISE(ABORT, 'audit is append-only'); END;--> statement-breakpoint
CREATE TRIGGER entries_no_update BEFORE UPDATE ON entries BEGIN SELECT RAISE(ABORT, 'entries is append-only'); END;--> statement-breakpoint
CREATE TRIGGER entries_no_delete BEFORE DELETE ON entries BEGIN SELECT RAISE(ABORT, 'entries is append-only'); END;--> statement-breakpoint
CREATE TRIGGER clearance_moves_no_update BEFORE UPDATE ON clearance_moves BEGIN SELECT RAISE(ABORT, 'clearance_moves is append-only'); END;--> statement-breakpoint
CREATE TRIGGER clearance_moves_no_delete BEFORE DELETE ON clearance_moves BEGIN SELECT RAISE(ABORT, 'clearance_moves is append-only'); END;--> statement-breakpoint
CREATE TRIGGER escalation_moves_no_update BEFORE UPDATE ON escalation_moves BEGIN SELECT RAISE(ABORT, 'escalation_moves is append-only'); END;--> statement-breakpoint
CREATE TRIGGER escalation_moves_no_delete BEFORE DELETE ON escalation_moves BEGIN SELECT RAISE(ABORT, 'escalation_moves is append-only'); END;--> statement-breakpoint
CREATE TRIGGER escalation_steps_no_update BEFORE UPDATE ON escalation_steps BEGIN SELECT RAISE(ABORT, 'escalation_steps is append-only'); END;--> statement-breakpoint
CREATE TRIGGER escalation_steps_no_delete BEFORE DELETE ON escalation_steps BEGIN SELECT RAISE(ABORT, 'escalation_steps is append-only'); END;--> statement-breakpoint
CREATE TRIGGER outbox_attempts_no_update BEFORE UPDATE ON outbox_attempts BEGIN SELECT RAISE(ABORT, 'outbox_attempts is append-only'); END;--> statement-breakpoint
CREATE TRIGGER outbox_attempts_no_delete BEFORE DELETE ON outbox_attempts BEGIN SELECT RAISE(ABORT, 'outbox_attempts is append-only'); END;--> statement-breakpoint
CREATE TRIGGER readings_no_update BEFORE UPDATE ON readings BEGIN SELECT RAISE(ABORT, 'readings is append-only'); END;--> statement-breakpoint
CREATE TRIGGER readings_no_delete BEFORE DELETE ON readings BEGIN SELECT RAISE(ABORT, 'readings is append-only'); END;--> statement-breakpoint
CREATE TRIGGER findings_no_update BEFORE UPDATE ON findings BEGIN SELECT RAISE(ABORT, 'findings is append-only'); END;--> statement-breakpoint
CREATE TRIGGER findings_no_delete BEFORE DELETE ON findings BEGIN SELECT RAISE(ABORT, 'findings is append-only'); END;--> statement-breakpoint
CREATE TRIGGER bedside_sessions_no_update BEFORE UPDATE ON bedside_sessions BEGIN SELECT RAISE(ABORT, 'bedside_sessions is append-only'); END;--> statement-breakpoint
CREATE TRIGGER bedside_sessions_no_delete BEFORE DELETE ON bedside_sessions BEGIN SELECT RAISE(ABORT, 'bedside_sessions is append-only'); END;--> statement-breakpoint
CREATE VIRTUAL TABLE entries_text USING fts5(body, content='entries', content_rowid='rowid', tokenize='unicode61 remove_diacritics 2');--> statement-breakpoint
CREATE TRIGGER entries_text_insert AFTER INSERT ON entries BEGIN INSERT INTO entries_text(rowid, body) VALUES (new.rowid, new.body); END;
