-- Who did what, chained: the hash of each row is over that of the row before and its own content.
-- Where a row came from may be erased with the member; the chain covers its salted hash alone.

CREATE TABLE audit (
  seq INTEGER NOT NULL PRIMARY KEY CHECK (seq > 0),
  club_id TEXT NOT NULL REFERENCES club (id),
  at TEXT NOT NULL CHECK (at LIKE '____-__-__T__:__:__.___Z'),
  member_id TEXT NOT NULL,
  act TEXT NOT NULL,
  subject_id TEXT NOT NULL,
  outcome TEXT NOT NULL,
  origin_sha256 BLOB CHECK (length(origin_sha256) = 32),
  hash BLOB NOT NULL CHECK (length(hash) = 32)
) STRICT;

CREATE INDEX audit_by_club ON audit (club_id, seq);

CREATE TABLE audit_origin (
  seq INTEGER NOT NULL PRIMARY KEY REFERENCES audit (seq),
  salt BLOB NOT NULL CHECK (length(salt) = 16),
  address TEXT NOT NULL
) STRICT;

CREATE TRIGGER audit_is_kept_update BEFORE UPDATE ON audit BEGIN SELECT RAISE(ABORT, 'audit is kept as it is'); END;
CREATE TRIGGER audit_is_kept_delete BEFORE DELETE ON audit BEGIN SELECT RAISE(ABORT, 'audit is kept as it is'); END;
CREATE TRIGGER audit_origin_is_kept_update BEFORE UPDATE ON audit_origin BEGIN SELECT RAISE(ABORT, 'audit_origin is kept as it is'); END;
