-- Why the facts of a sweep were corrected; empty for what was told with the upload.

ALTER TABLE sweep_facts ADD COLUMN reason TEXT NOT NULL DEFAULT '';
