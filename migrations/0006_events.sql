-- Beside its subject an event tells what else it concerns, so that a listener need not ask.

ALTER TABLE event ADD COLUMN details TEXT NOT NULL DEFAULT '{}' CHECK (json_valid(details));
