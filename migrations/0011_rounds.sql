-- Rounds: several instruments measure one antenna or one load in a period, to be compared.

CREATE TABLE round (
  club_id TEXT NOT NULL REFERENCES club (id),
  id TEXT NOT NULL,
  added_at TEXT NOT NULL CHECK (added_at LIKE '____-__-__T__:__:__.___Z'),
  added_by TEXT NOT NULL,
  begins_at TEXT NOT NULL CHECK (begins_at LIKE '____-__-__T__:__:__.___Z'),
  facts TEXT NOT NULL CHECK (json_valid(facts)),
  PRIMARY KEY (club_id, id)
) STRICT;

CREATE INDEX round_by_time ON round (club_id, begins_at DESC, id DESC);

CREATE TRIGGER round_is_kept_update BEFORE UPDATE ON round BEGIN SELECT RAISE(ABORT, 'round is kept as it is'); END;
CREATE TRIGGER round_is_kept_delete BEFORE DELETE ON round BEGIN SELECT RAISE(ABORT, 'round is kept as it is'); END;
