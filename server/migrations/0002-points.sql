-- A list may be points now, and its claim says so; the column of its own beside the claim could not.
ALTER TABLE takes DROP COLUMN measure;
