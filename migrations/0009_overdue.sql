-- Which due date of an antenna listeners were told has passed, so that each is told once.

CREATE TABLE overdue_told (
  club_id TEXT NOT NULL,
  antenna_id TEXT NOT NULL,
  due_at TEXT NOT NULL CHECK (due_at LIKE '____-__-__T__:__:__.___Z'),
  PRIMARY KEY (club_id, antenna_id)
) STRICT, WITHOUT ROWID;
