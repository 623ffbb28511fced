-- A club's own cables, and sweeps into feed lines whose far end is known.

CREATE TABLE cable (
  club_id TEXT NOT NULL REFERENCES club (id),
  id TEXT NOT NULL,
  key TEXT NOT NULL,
  created_at TEXT NOT NULL CHECK (created_at LIKE '____-__-__T__:__:__.___Z'),
  created_by TEXT NOT NULL,
  facts TEXT NOT NULL CHECK (json_valid(facts)),
  PRIMARY KEY (club_id, id),
  UNIQUE (club_id, key)
) STRICT;

-- One file may be checked again under other facts (a far end that was told wrong), never under the same.
CREATE TABLE line_check (
  club_id TEXT NOT NULL REFERENCES club (id),
  id TEXT NOT NULL,
  antenna_id TEXT NOT NULL,
  received_at TEXT NOT NULL CHECK (received_at LIKE '____-__-__T__:__:__.___Z'),
  sort_at TEXT NOT NULL CHECK (sort_at LIKE '____-__-__T__:__:__.___Z'),
  uploaded_by TEXT NOT NULL,
  file_sha256 BLOB NOT NULL,
  tested TEXT NOT NULL CHECK (json_valid(tested)),
  facts TEXT NOT NULL CHECK (json_valid(facts)),
  measured TEXT NOT NULL CHECK (json_valid(measured)),
  report TEXT NOT NULL CHECK (json_valid(report)),
  trace BLOB NOT NULL,
  PRIMARY KEY (club_id, id),
  UNIQUE (club_id, antenna_id, file_sha256, tested),
  FOREIGN KEY (club_id, file_sha256) REFERENCES file (club_id, sha256)
) STRICT;

CREATE INDEX line_check_by_antenna ON line_check (club_id, antenna_id, sort_at DESC, id DESC);

CREATE TRIGGER cable_is_kept_update BEFORE UPDATE ON cable BEGIN SELECT RAISE(ABORT, 'cable is kept as it is'); END;
CREATE TRIGGER cable_is_kept_delete BEFORE DELETE ON cable BEGIN SELECT RAISE(ABORT, 'cable is kept as it is'); END;
CREATE TRIGGER line_check_is_kept_update BEFORE UPDATE ON line_check BEGIN SELECT RAISE(ABORT, 'line_check is kept as it is'); END;
CREATE TRIGGER line_check_is_kept_delete BEFORE DELETE ON line_check BEGIN SELECT RAISE(ABORT, 'line_check is kept as it is'); END;
