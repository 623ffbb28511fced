-- Everything below belongs to one club: club_id leads every key.

CREATE TABLE club (
  id TEXT NOT NULL PRIMARY KEY,
  key TEXT NOT NULL UNIQUE,
  name TEXT NOT NULL,
  invented INTEGER NOT NULL CHECK (invented IN (0, 1)),
  created_at TEXT NOT NULL CHECK (created_at LIKE '____-__-__T__:__:__.___Z')
) STRICT;

CREATE TABLE token (
  id TEXT NOT NULL PRIMARY KEY,
  club_id TEXT NOT NULL REFERENCES club (id),
  member_id TEXT NOT NULL,
  label TEXT NOT NULL,
  secret_sha256 BLOB NOT NULL UNIQUE CHECK (length(secret_sha256) = 32),
  created_at TEXT NOT NULL CHECK (created_at LIKE '____-__-__T__:__:__.___Z')
) STRICT;

-- Sites, antennas and analyzers: the present state here, every state in resource_revision.
CREATE TABLE resource (
  club_id TEXT NOT NULL REFERENCES club (id),
  kind TEXT NOT NULL CHECK (kind IN ('sites', 'antennas', 'analyzers')),
  id TEXT NOT NULL,
  key TEXT NOT NULL,
  site_id TEXT,
  revision INTEGER NOT NULL CHECK (revision > 0),
  created_at TEXT NOT NULL CHECK (created_at LIKE '____-__-__T__:__:__.___Z'),
  updated_at TEXT NOT NULL CHECK (updated_at LIKE '____-__-__T__:__:__.___Z'),
  facts TEXT NOT NULL CHECK (json_valid(facts)),
  PRIMARY KEY (club_id, kind, id),
  UNIQUE (club_id, kind, key)
) STRICT;

CREATE INDEX resource_by_site ON resource (club_id, kind, site_id, key, id) WHERE site_id IS NOT NULL;

CREATE TABLE resource_revision (
  club_id TEXT NOT NULL,
  kind TEXT NOT NULL,
  id TEXT NOT NULL,
  revision INTEGER NOT NULL,
  key TEXT NOT NULL,
  facts TEXT NOT NULL CHECK (json_valid(facts)),
  at TEXT NOT NULL CHECK (at LIKE '____-__-__T__:__:__.___Z'),
  member_id TEXT NOT NULL,
  PRIMARY KEY (club_id, kind, id, revision),
  FOREIGN KEY (club_id, kind, id) REFERENCES resource (club_id, kind, id)
) STRICT;

-- Files byte for byte, compressed, under the SHA-256 of what was sent.
CREATE TABLE file (
  club_id TEXT NOT NULL REFERENCES club (id),
  sha256 BLOB NOT NULL CHECK (length(sha256) = 32),
  bytes INTEGER NOT NULL CHECK (bytes >= 0),
  codec TEXT NOT NULL CHECK (codec IN ('none', 'deflate')),
  body BLOB NOT NULL,
  PRIMARY KEY (club_id, sha256)
) STRICT;

-- What was measured.
CREATE TABLE sweep (
  club_id TEXT NOT NULL REFERENCES club (id),
  id TEXT NOT NULL,
  received_at TEXT NOT NULL CHECK (received_at LIKE '____-__-__T__:__:__.___Z'),
  uploaded_by TEXT NOT NULL,
  file_sha256 BLOB NOT NULL,
  measured TEXT NOT NULL CHECK (json_valid(measured)),
  points BLOB NOT NULL,
  PRIMARY KEY (club_id, id),
  UNIQUE (club_id, file_sha256),
  FOREIGN KEY (club_id, file_sha256) REFERENCES file (club_id, sha256)
) STRICT;

-- What is told about a sweep; a correction is one more revision.
CREATE TABLE sweep_facts (
  club_id TEXT NOT NULL,
  sweep_id TEXT NOT NULL,
  revision INTEGER NOT NULL CHECK (revision > 0),
  facts TEXT NOT NULL CHECK (json_valid(facts)),
  at TEXT NOT NULL CHECK (at LIKE '____-__-__T__:__:__.___Z'),
  member_id TEXT NOT NULL,
  PRIMARY KEY (club_id, sweep_id, revision),
  FOREIGN KEY (club_id, sweep_id) REFERENCES sweep (club_id, id)
) STRICT;

-- Which revision holds, and what lists are ordered by.
CREATE TABLE sweep_current (
  club_id TEXT NOT NULL,
  sweep_id TEXT NOT NULL,
  revision INTEGER NOT NULL,
  antenna_id TEXT NOT NULL,
  sort_at TEXT NOT NULL CHECK (sort_at LIKE '____-__-__T__:__:__.___Z'),
  PRIMARY KEY (club_id, sweep_id),
  FOREIGN KEY (club_id, sweep_id, revision) REFERENCES sweep_facts (club_id, sweep_id, revision)
) STRICT, WITHOUT ROWID;

CREATE INDEX sweep_by_antenna ON sweep_current (club_id, antenna_id, sort_at DESC, sweep_id DESC);

-- Derived answers as they are sent, deflated, one row for each analysis version.
CREATE TABLE summary (
  club_id TEXT NOT NULL,
  sweep_id TEXT NOT NULL,
  analysis_version TEXT NOT NULL,
  summary BLOB NOT NULL,
  usable BLOB NOT NULL,
  PRIMARY KEY (club_id, sweep_id, analysis_version),
  FOREIGN KEY (club_id, sweep_id) REFERENCES sweep (club_id, id)
) STRICT;

-- What happened, written with the change itself.
CREATE TABLE event (
  seq INTEGER PRIMARY KEY AUTOINCREMENT,
  club_id TEXT NOT NULL,
  kind TEXT NOT NULL,
  subject_id TEXT NOT NULL,
  at TEXT NOT NULL CHECK (at LIKE '____-__-__T__:__:__.___Z'),
  member_id TEXT NOT NULL
) STRICT;

CREATE INDEX event_by_club ON event (club_id, seq);

CREATE TRIGGER file_is_kept_update BEFORE UPDATE ON file BEGIN SELECT RAISE(ABORT, 'file is kept as it is'); END;
CREATE TRIGGER file_is_kept_delete BEFORE DELETE ON file BEGIN SELECT RAISE(ABORT, 'file is kept as it is'); END;
CREATE TRIGGER sweep_is_kept_update BEFORE UPDATE ON sweep BEGIN SELECT RAISE(ABORT, 'sweep is kept as it is'); END;
CREATE TRIGGER sweep_is_kept_delete BEFORE DELETE ON sweep BEGIN SELECT RAISE(ABORT, 'sweep is kept as it is'); END;
CREATE TRIGGER sweep_facts_are_kept_update BEFORE UPDATE ON sweep_facts BEGIN SELECT RAISE(ABORT, 'sweep_facts is kept as it is'); END;
CREATE TRIGGER sweep_facts_are_kept_delete BEFORE DELETE ON sweep_facts BEGIN SELECT RAISE(ABORT, 'sweep_facts is kept as it is'); END;
CREATE TRIGGER sweep_current_is_kept BEFORE DELETE ON sweep_current BEGIN SELECT RAISE(ABORT, 'sweep_current is kept'); END;
CREATE TRIGGER summary_is_kept_update BEFORE UPDATE ON summary BEGIN SELECT RAISE(ABORT, 'summary is kept as it is'); END;
CREATE TRIGGER summary_is_kept_delete BEFORE DELETE ON summary BEGIN SELECT RAISE(ABORT, 'summary is kept as it is'); END;
CREATE TRIGGER resource_is_kept BEFORE DELETE ON resource BEGIN SELECT RAISE(ABORT, 'resource is kept'); END;
CREATE TRIGGER resource_revision_is_kept_update BEFORE UPDATE ON resource_revision BEGIN SELECT RAISE(ABORT, 'resource_revision is kept as it is'); END;
CREATE TRIGGER resource_revision_is_kept_delete BEFORE DELETE ON resource_revision BEGIN SELECT RAISE(ABORT, 'resource_revision is kept as it is'); END;
CREATE TRIGGER event_is_kept_update BEFORE UPDATE ON event BEGIN SELECT RAISE(ABORT, 'event is kept as it is'); END;
CREATE TRIGGER event_is_kept_delete BEFORE DELETE ON event BEGIN SELECT RAISE(ABORT, 'event is kept as it is'); END;
