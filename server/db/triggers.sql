-- What is sealed, declared, drawn, counted or recorded never changes: not by an UPDATE, a DELETE or a REPLACE.
-- Dropped before and created after the migrations at each start (a table rebuild loses triggers).
-- REPLACE is refused by the DELETE triggers, which fire because recursive_triggers is ON.

CREATE TRIGGER sealed_frame_update BEFORE UPDATE ON frame_versions WHEN OLD.sealed_at IS NOT NULL
BEGIN SELECT RAISE(ABORT, 'a sealed frame never changes'); END;
CREATE TRIGGER sealed_frame_delete BEFORE DELETE ON frame_versions WHEN OLD.sealed_at IS NOT NULL
BEGIN SELECT RAISE(ABORT, 'a sealed frame never changes'); END;

CREATE TRIGGER area_versions_update BEFORE UPDATE ON area_versions
BEGIN SELECT RAISE(ABORT, 'area_versions is append-only'); END;
CREATE TRIGGER area_versions_delete BEFORE DELETE ON area_versions
BEGIN SELECT RAISE(ABORT, 'area_versions is append-only'); END;

CREATE TRIGGER planes_update BEFORE UPDATE ON planes
BEGIN SELECT RAISE(ABORT, 'planes is append-only'); END;
CREATE TRIGGER planes_delete BEFORE DELETE ON planes
BEGIN SELECT RAISE(ABORT, 'planes is append-only'); END;

CREATE TRIGGER declarations_update BEFORE UPDATE ON declarations
BEGIN SELECT RAISE(ABORT, 'declarations is append-only'); END;
CREATE TRIGGER declarations_delete BEFORE DELETE ON declarations
BEGIN SELECT RAISE(ABORT, 'declarations is append-only'); END;

CREATE TRIGGER declarations_abandoned_update BEFORE UPDATE ON declarations_abandoned
BEGIN SELECT RAISE(ABORT, 'declarations_abandoned is append-only'); END;
CREATE TRIGGER declarations_abandoned_delete BEFORE DELETE ON declarations_abandoned
BEGIN SELECT RAISE(ABORT, 'declarations_abandoned is append-only'); END;

CREATE TRIGGER seeds_update BEFORE UPDATE ON seeds
BEGIN SELECT RAISE(ABORT, 'seeds is append-only'); END;
CREATE TRIGGER seeds_delete BEFORE DELETE ON seeds
BEGIN SELECT RAISE(ABORT, 'seeds is append-only'); END;

CREATE TRIGGER draws_update BEFORE UPDATE ON draws
BEGIN SELECT RAISE(ABORT, 'draws is append-only'); END;
CREATE TRIGGER draws_delete BEFORE DELETE ON draws
BEGIN SELECT RAISE(ABORT, 'draws is append-only'); END;

CREATE TRIGGER draw_entries_update BEFORE UPDATE ON draw_entries
BEGIN SELECT RAISE(ABORT, 'draw_entries is append-only'); END;
CREATE TRIGGER draw_entries_delete BEFORE DELETE ON draw_entries
BEGIN SELECT RAISE(ABORT, 'draw_entries is append-only'); END;

CREATE TRIGGER draws_withdrawn_update BEFORE UPDATE ON draws_withdrawn
BEGIN SELECT RAISE(ABORT, 'draws_withdrawn is append-only'); END;
CREATE TRIGGER draws_withdrawn_delete BEFORE DELETE ON draws_withdrawn
BEGIN SELECT RAISE(ABORT, 'draws_withdrawn is append-only'); END;

CREATE TRIGGER pick_acts_update BEFORE UPDATE ON pick_acts
BEGIN SELECT RAISE(ABORT, 'pick_acts is append-only'); END;
CREATE TRIGGER pick_acts_delete BEFORE DELETE ON pick_acts
BEGIN SELECT RAISE(ABORT, 'pick_acts is append-only'); END;

CREATE TRIGGER count_imports_update BEFORE UPDATE ON count_imports
BEGIN SELECT RAISE(ABORT, 'count_imports is append-only'); END;
CREATE TRIGGER count_imports_delete BEFORE DELETE ON count_imports
BEGIN SELECT RAISE(ABORT, 'count_imports is append-only'); END;

CREATE TRIGGER count_entries_update BEFORE UPDATE ON count_entries
BEGIN SELECT RAISE(ABORT, 'count_entries is append-only'); END;
CREATE TRIGGER count_entries_delete BEFORE DELETE ON count_entries
BEGIN SELECT RAISE(ABORT, 'count_entries is append-only'); END;

CREATE TRIGGER events_update BEFORE UPDATE ON events
BEGIN SELECT RAISE(ABORT, 'events is append-only'); END;
CREATE TRIGGER events_delete BEFORE DELETE ON events
BEGIN SELECT RAISE(ABORT, 'events is append-only'); END;

CREATE TRIGGER kept_estimates_update BEFORE UPDATE ON kept_estimates
BEGIN SELECT RAISE(ABORT, 'kept_estimates is append-only'); END;
CREATE TRIGGER kept_estimates_delete BEFORE DELETE ON kept_estimates
BEGIN SELECT RAISE(ABORT, 'kept_estimates is append-only'); END;
