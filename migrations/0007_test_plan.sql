-- Which sweeps an antenna is held against, and how often it is to be tested. The newest row holds.

-- `era` is the id of the work that began it, empty for the first; no sweeps: automatic again.
CREATE TABLE baseline (
  seq INTEGER PRIMARY KEY AUTOINCREMENT,
  club_id TEXT NOT NULL REFERENCES club (id),
  antenna_id TEXT NOT NULL,
  era TEXT NOT NULL,
  sweeps TEXT NOT NULL CHECK (json_valid(sweeps)),
  at TEXT NOT NULL CHECK (at LIKE '____-__-__T__:__:__.___Z'),
  member_id TEXT NOT NULL
) STRICT;

CREATE INDEX baseline_by_antenna ON baseline (club_id, antenna_id, seq);

CREATE TABLE test_interval (
  seq INTEGER PRIMARY KEY AUTOINCREMENT,
  club_id TEXT NOT NULL REFERENCES club (id),
  days INTEGER CHECK (days > 0),
  at TEXT NOT NULL CHECK (at LIKE '____-__-__T__:__:__.___Z'),
  member_id TEXT NOT NULL
) STRICT;

CREATE INDEX test_interval_by_club ON test_interval (club_id, seq);

CREATE TRIGGER baseline_is_kept_update BEFORE UPDATE ON baseline BEGIN SELECT RAISE(ABORT, 'baseline is kept as it is'); END;
CREATE TRIGGER baseline_is_kept_delete BEFORE DELETE ON baseline BEGIN SELECT RAISE(ABORT, 'baseline is kept as it is'); END;
CREATE TRIGGER test_interval_is_kept_update BEFORE UPDATE ON test_interval BEGIN SELECT RAISE(ABORT, 'test_interval is kept as it is'); END;
CREATE TRIGGER test_interval_is_kept_delete BEFORE DELETE ON test_interval BEGIN SELECT RAISE(ABORT, 'test_interval is kept as it is'); END;
