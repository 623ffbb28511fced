-- Work that was told wrong: it stays on record, and begins no era any more.

CREATE TABLE work_withdrawal (
  club_id TEXT NOT NULL,
  work_id TEXT NOT NULL,
  reason TEXT NOT NULL,
  at TEXT NOT NULL CHECK (at LIKE '____-__-__T__:__:__.___Z'),
  member_id TEXT NOT NULL,
  PRIMARY KEY (club_id, work_id),
  FOREIGN KEY (club_id, work_id) REFERENCES work_entry (club_id, id)
) STRICT;

CREATE TRIGGER work_withdrawal_is_kept_update BEFORE UPDATE ON work_withdrawal BEGIN SELECT RAISE(ABORT, 'work_withdrawal is kept as it is'); END;
CREATE TRIGGER work_withdrawal_is_kept_delete BEFORE DELETE ON work_withdrawal BEGIN SELECT RAISE(ABORT, 'work_withdrawal is kept as it is'); END;
