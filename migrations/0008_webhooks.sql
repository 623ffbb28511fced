-- Where a club's events are sent, and how far that has come: `sent_seq` is the last event that was
-- sent or passed over. The secret signs what is sent, so it is kept as it is.

CREATE TABLE webhook (
  club_id TEXT NOT NULL REFERENCES club (id),
  id TEXT NOT NULL,
  revision INTEGER NOT NULL CHECK (revision > 0),
  created_at TEXT NOT NULL CHECK (created_at LIKE '____-__-__T__:__:__.___Z'),
  updated_at TEXT NOT NULL CHECK (updated_at LIKE '____-__-__T__:__:__.___Z'),
  facts TEXT NOT NULL CHECK (json_valid(facts)),
  active INTEGER NOT NULL CHECK (active IN (0, 1)),
  secret TEXT NOT NULL,
  sent_seq INTEGER NOT NULL,
  failures INTEGER NOT NULL DEFAULT 0 CHECK (failures >= 0),
  next_attempt_at TEXT CHECK (next_attempt_at LIKE '____-__-__T__:__:__.___Z'),
  last_attempt TEXT CHECK (json_valid(last_attempt)),
  PRIMARY KEY (club_id, id)
) STRICT;

CREATE INDEX webhook_active ON webhook (active, club_id, id);
