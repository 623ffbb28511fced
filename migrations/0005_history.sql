-- What each sweep measured, found by antenna, band and time, and the work that was done on antennas.

-- `basis` is what the measures follow from beside the sweep; where it is another by now they are made anew.
CREATE TABLE sweep_measures (
  club_id TEXT NOT NULL,
  sweep_id TEXT NOT NULL,
  basis TEXT NOT NULL,
  measures TEXT NOT NULL CHECK (json_valid(measures)),
  PRIMARY KEY (club_id, sweep_id),
  FOREIGN KEY (club_id, sweep_id) REFERENCES sweep (club_id, id)
) STRICT;

-- A row for each band of a sweep, and one without a band for the sweep as a whole. Analyzer and
-- weather are empty where they are not known.
CREATE TABLE history (
  club_id TEXT NOT NULL,
  sweep_id TEXT NOT NULL,
  band TEXT NOT NULL,
  antenna_id TEXT NOT NULL,
  sort_at TEXT NOT NULL CHECK (sort_at LIKE '____-__-__T__:__:__.___Z'),
  analyzer_id TEXT NOT NULL,
  weather TEXT NOT NULL,
  PRIMARY KEY (club_id, sweep_id, band),
  FOREIGN KEY (club_id, sweep_id) REFERENCES sweep (club_id, id)
) STRICT, WITHOUT ROWID;

CREATE INDEX history_by_time ON history (club_id, antenna_id, band, sort_at, sweep_id);
CREATE INDEX history_by_analyzer ON history (club_id, antenna_id, band, analyzer_id, sort_at, sweep_id);
CREATE INDEX history_by_weather ON history (club_id, antenna_id, band, weather, sort_at, sweep_id);

-- Sweeps whose measures are still to be made.
CREATE TABLE unmeasured (
  club_id TEXT NOT NULL,
  sweep_id TEXT NOT NULL,
  PRIMARY KEY (club_id, sweep_id)
) STRICT, WITHOUT ROWID;

INSERT INTO unmeasured (club_id, sweep_id) SELECT club_id, sweep_id FROM sweep_current;

INSERT INTO history (club_id, sweep_id, band, antenna_id, sort_at, analyzer_id, weather)
SELECT sweep_current.club_id, sweep_current.sweep_id, '', antenna_id, sort_at,
  coalesce(json_extract(facts, '$.analyzerId'), ''), ''
FROM sweep_current
JOIN sweep_facts ON sweep_facts.club_id = sweep_current.club_id
  AND sweep_facts.sweep_id = sweep_current.sweep_id AND sweep_facts.revision = sweep_current.revision;

CREATE TABLE work_entry (
  club_id TEXT NOT NULL REFERENCES club (id),
  id TEXT NOT NULL,
  antenna_id TEXT NOT NULL,
  done_at TEXT NOT NULL CHECK (done_at LIKE '____-__-__T__:__:__.___Z'),
  added_at TEXT NOT NULL CHECK (added_at LIKE '____-__-__T__:__:__.___Z'),
  added_by TEXT NOT NULL,
  facts TEXT NOT NULL CHECK (json_valid(facts)),
  PRIMARY KEY (club_id, id)
) STRICT;

CREATE INDEX work_by_antenna ON work_entry (club_id, antenna_id, done_at, id);

CREATE TRIGGER work_entry_is_kept_update BEFORE UPDATE ON work_entry BEGIN SELECT RAISE(ABORT, 'work_entry is kept as it is'); END;
CREATE TRIGGER work_entry_is_kept_delete BEFORE DELETE ON work_entry BEGIN SELECT RAISE(ABORT, 'work_entry is kept as it is'); END;
