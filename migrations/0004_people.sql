-- People and what they may do. All that tells who somebody is stands in person and nowhere else:
-- records keep the member's id, so erasing a person is deleting one row.

ALTER TABLE club ADD COLUMN revision INTEGER NOT NULL DEFAULT 1 CHECK (revision > 0);
ALTER TABLE club ADD COLUMN updated_at TEXT NOT NULL DEFAULT '1970-01-01T00:00:00.000Z'
  CHECK (updated_at LIKE '____-__-__T__:__:__.___Z');
ALTER TABLE club ADD COLUMN public_dashboard INTEGER NOT NULL DEFAULT 0 CHECK (public_dashboard IN (0, 1));
UPDATE club SET updated_at = created_at;

CREATE TABLE member (
  club_id TEXT NOT NULL REFERENCES club (id),
  id TEXT NOT NULL,
  revision INTEGER NOT NULL CHECK (revision > 0),
  role TEXT NOT NULL CHECK (role IN ('reader', 'measurer', 'keeper', 'steward')),
  active INTEGER NOT NULL CHECK (active IN (0, 1)),
  pseudonym TEXT NOT NULL,
  shown_as TEXT NOT NULL CHECK (shown_as IN ('name', 'pseudonym')),
  created_at TEXT NOT NULL CHECK (created_at LIKE '____-__-__T__:__:__.___Z'),
  updated_at TEXT NOT NULL CHECK (updated_at LIKE '____-__-__T__:__:__.___Z'),
  erased_at TEXT CHECK (erased_at LIKE '____-__-__T__:__:__.___Z'),
  PRIMARY KEY (club_id, id),
  UNIQUE (club_id, pseudonym)
) STRICT;

CREATE TABLE person (
  club_id TEXT NOT NULL,
  member_id TEXT NOT NULL,
  name TEXT NOT NULL,
  call_sign TEXT,
  contact TEXT,
  PRIMARY KEY (club_id, member_id),
  FOREIGN KEY (club_id, member_id) REFERENCES member (club_id, id)
) STRICT;

-- Whoever had a token until now could do everything.
INSERT INTO member (club_id, id, revision, role, active, pseudonym, shown_as, created_at, updated_at)
SELECT club_id, member_id, 1, 'steward', 1,
  'Member ' || row_number() OVER (PARTITION BY club_id ORDER BY min(created_at), member_id),
  'pseudonym', min(created_at), min(created_at)
FROM token GROUP BY club_id, member_id;

-- Made anew, for its members are now in a table and its time may end.
CREATE TABLE token_of_member (
  id TEXT NOT NULL PRIMARY KEY,
  club_id TEXT NOT NULL,
  member_id TEXT NOT NULL,
  label TEXT NOT NULL,
  secret_sha256 BLOB NOT NULL UNIQUE CHECK (length(secret_sha256) = 32),
  -- A JSON list of rights that narrows the role; null: all that the role has.
  scopes TEXT CHECK (json_valid(scopes)),
  created_at TEXT NOT NULL CHECK (created_at LIKE '____-__-__T__:__:__.___Z'),
  expires_at TEXT CHECK (expires_at LIKE '____-__-__T__:__:__.___Z'),
  revoked_at TEXT CHECK (revoked_at LIKE '____-__-__T__:__:__.___Z'),
  last_used_at TEXT CHECK (last_used_at LIKE '____-__-__T__:__:__.___Z'),
  FOREIGN KEY (club_id, member_id) REFERENCES member (club_id, id)
) STRICT;
INSERT INTO token_of_member (id, club_id, member_id, label, secret_sha256, created_at)
SELECT id, club_id, member_id, label, secret_sha256, created_at FROM token;
DROP TABLE token;
ALTER TABLE token_of_member RENAME TO token;
CREATE INDEX token_by_club ON token (club_id, id);
CREATE INDEX token_by_member ON token (club_id, member_id, id);

CREATE TRIGGER member_is_kept BEFORE DELETE ON member BEGIN SELECT RAISE(ABORT, 'member is kept'); END;
CREATE TRIGGER token_is_kept BEFORE DELETE ON token BEGIN SELECT RAISE(ABORT, 'token is kept'); END;
