-- Sweeps of a load whose resistance is known: what tells an analyzer's own error.

CREATE TABLE load_check (
  club_id TEXT NOT NULL REFERENCES club (id),
  id TEXT NOT NULL,
  analyzer_id TEXT NOT NULL,
  received_at TEXT NOT NULL CHECK (received_at LIKE '____-__-__T__:__:__.___Z'),
  sort_at TEXT NOT NULL CHECK (sort_at LIKE '____-__-__T__:__:__.___Z'),
  uploaded_by TEXT NOT NULL,
  file_sha256 BLOB NOT NULL,
  facts TEXT NOT NULL CHECK (json_valid(facts)),
  measured TEXT NOT NULL CHECK (json_valid(measured)),
  points BLOB NOT NULL,
  PRIMARY KEY (club_id, id),
  UNIQUE (club_id, file_sha256),
  FOREIGN KEY (club_id, file_sha256) REFERENCES file (club_id, sha256)
) STRICT;

CREATE INDEX load_check_by_analyzer ON load_check (club_id, analyzer_id, sort_at DESC, id DESC);

CREATE TRIGGER load_check_is_kept_update BEFORE UPDATE ON load_check BEGIN SELECT RAISE(ABORT, 'load_check is kept as it is'); END;
CREATE TRIGGER load_check_is_kept_delete BEFORE DELETE ON load_check BEGIN SELECT RAISE(ABORT, 'load_check is kept as it is'); END;
