-- Times are ISO 8601 text in UTC, days are YYYY-MM-DD. JSON columns hold immutable lists only.

CREATE TABLE settings (
  key TEXT PRIMARY KEY,
  value TEXT NOT NULL
) STRICT;

CREATE TABLE people (
  id TEXT PRIMARY KEY,
  email TEXT NOT NULL UNIQUE COLLATE NOCASE CHECK (length(email) BETWEEN 3 AND 254),
  name TEXT NOT NULL CHECK (length(name) BETWEEN 1 AND 80),
  -- Null: may not sign in (no invitation accepted yet, or a member who never needs to).
  password_hash TEXT,
  keeper INTEGER NOT NULL DEFAULT 0 CHECK (keeper IN (0, 1)),
  mail_wish TEXT NOT NULL DEFAULT 'all' CHECK (mail_wish IN ('all', 'own-takes', 'none')),
  disabled_at TEXT,
  version INTEGER NOT NULL DEFAULT 1 CHECK (version >= 1),
  created_at TEXT NOT NULL
) STRICT;

CREATE TABLE sessions (
  id TEXT PRIMARY KEY,
  token_hash TEXT NOT NULL UNIQUE,
  person_id TEXT NOT NULL REFERENCES people (id) ON DELETE CASCADE,
  device TEXT NOT NULL DEFAULT '',
  address TEXT NOT NULL DEFAULT '',
  created_at TEXT NOT NULL,
  seen_at TEXT NOT NULL,
  ended_at TEXT
) STRICT;
CREATE INDEX sessions_by_person ON sessions (person_id, ended_at);

CREATE TABLE productions (
  id TEXT PRIMARY KEY,
  slug TEXT NOT NULL UNIQUE,
  title TEXT NOT NULL CHECK (length(title) BETWEEN 1 AND 120),
  -- Number of the newest event: raised in the same transaction that writes the event.
  event_number INTEGER NOT NULL DEFAULT 0 CHECK (event_number >= 0),
  created_at TEXT NOT NULL
) STRICT;

CREATE TABLE memberships (
  production_id TEXT NOT NULL REFERENCES productions (id) ON DELETE CASCADE,
  person_id TEXT NOT NULL REFERENCES people (id) ON DELETE CASCADE,
  role TEXT NOT NULL CHECK (role IN ('guest', 'animator', 'supervisor', 'coordinator')),
  version INTEGER NOT NULL DEFAULT 1 CHECK (version >= 1),
  created_at TEXT NOT NULL,
  PRIMARY KEY (production_id, person_id)
) STRICT;
CREATE INDEX memberships_by_person ON memberships (person_id);

-- One-use links: invitations and forgotten passwords. Only a hash of the secret is kept.
CREATE TABLE links (
  id TEXT PRIMARY KEY,
  kind TEXT NOT NULL CHECK (kind IN ('invitation', 'reset')),
  token_hash TEXT NOT NULL UNIQUE,
  email TEXT NOT NULL COLLATE NOCASE,
  name TEXT NOT NULL,
  keeper INTEGER NOT NULL DEFAULT 0 CHECK (keeper IN (0, 1)),
  production_id TEXT REFERENCES productions (id) ON DELETE CASCADE,
  role TEXT CHECK (role IN ('guest', 'animator', 'supervisor', 'coordinator')),
  person_id TEXT REFERENCES people (id) ON DELETE CASCADE,
  made_by TEXT REFERENCES people (id) ON DELETE SET NULL,
  created_at TEXT NOT NULL,
  expires_at TEXT NOT NULL,
  used_at TEXT,
  CHECK ((production_id IS NULL) = (role IS NULL)),
  CHECK ((kind = 'reset') = (person_id IS NOT NULL))
) STRICT;
CREATE INDEX links_open ON links (kind, used_at, expires_at);

CREATE TABLE sequences (
  id TEXT PRIMARY KEY,
  production_id TEXT NOT NULL REFERENCES productions (id) ON DELETE CASCADE,
  code TEXT NOT NULL,
  title TEXT NOT NULL CHECK (length(title) BETWEEN 1 AND 120),
  position INTEGER NOT NULL CHECK (position >= 0),
  UNIQUE (production_id, code),
  -- Lets a shot's foreign key insist on a sequence of its own production.
  UNIQUE (id, production_id)
) STRICT;

CREATE TABLE shots (
  id TEXT PRIMARY KEY,
  client_id TEXT NOT NULL,
  production_id TEXT NOT NULL REFERENCES productions (id) ON DELETE CASCADE,
  sequence_id TEXT NOT NULL,
  code TEXT NOT NULL,
  title TEXT NOT NULL CHECK (length(title) BETWEEN 1 AND 120),
  first_frame INTEGER NOT NULL,
  last_frame INTEGER NOT NULL,
  fps REAL NOT NULL CHECK (fps BETWEEN 1 AND 240),
  brief TEXT NOT NULL DEFAULT '',
  position INTEGER NOT NULL CHECK (position >= 0),
  due_on TEXT CHECK (due_on IS NULL OR due_on GLOB '[0-9][0-9][0-9][0-9]-[0-9][0-9]-[0-9][0-9]'),
  animator_id TEXT REFERENCES people (id) ON DELETE SET NULL,
  supervisor_id TEXT REFERENCES people (id) ON DELETE SET NULL,
  claim TEXT CHECK (claim IS NULL OR json_valid(claim)),
  version INTEGER NOT NULL DEFAULT 1 CHECK (version >= 1),
  created_by TEXT REFERENCES people (id) ON DELETE SET NULL,
  created_at TEXT NOT NULL,
  UNIQUE (production_id, code),
  UNIQUE (created_by, client_id),
  CHECK (last_frame >= first_frame),
  FOREIGN KEY (sequence_id, production_id) REFERENCES sequences (id, production_id)
) STRICT;
CREATE INDEX shots_in_order ON shots (production_id, sequence_id, position);
CREATE INDEX shots_by_animator ON shots (animator_id);

CREATE TABLE takes (
  -- Small columns first, and the sketch before the lists: the wall reads them without walking through a long answer.
  id TEXT PRIMARY KEY,
  client_id TEXT NOT NULL,
  shot_id TEXT NOT NULL REFERENCES shots (id) ON DELETE CASCADE,
  number INTEGER NOT NULL CHECK (number >= 1),
  person_id TEXT NOT NULL REFERENCES people (id),
  created_at TEXT NOT NULL,
  withdrawn_at TEXT,
  verdict TEXT NOT NULL CHECK (verdict IN ('holds', 'breaks', 'undecided')),
  judge_version TEXT NOT NULL,
  measure TEXT NOT NULL CHECK (measure IN ('angle', 'distance', 'arc')),
  unit TEXT NOT NULL,
  slop REAL NOT NULL CHECK (slop >= 0),
  tolerance REAL NOT NULL CHECK (tolerance BETWEEN 0 AND 1),
  fps REAL NOT NULL CHECK (fps BETWEEN 1 AND 240),
  -- What a sheet of the wall draws: kept beside the answer so that 400 sheets never parse 400 answers.
  sketch TEXT NOT NULL CHECK (json_valid(sketch)),
  -- The whole claim as it stood when the list was judged.
  claim TEXT NOT NULL CHECK (json_valid(claim)),
  note TEXT NOT NULL DEFAULT '',
  keys TEXT NOT NULL CHECK (json_valid(keys)),
  answer TEXT NOT NULL CHECK (json_valid(answer)),
  UNIQUE (shot_id, number),
  UNIQUE (person_id, client_id)
) STRICT;

CREATE TABLE flags (
  id TEXT PRIMARY KEY,
  client_id TEXT NOT NULL,
  take_id TEXT NOT NULL REFERENCES takes (id) ON DELETE CASCADE,
  from_frame INTEGER NOT NULL,
  to_frame INTEGER NOT NULL,
  reason TEXT NOT NULL CHECK (length(reason) >= 1),
  finding TEXT CHECK (finding IS NULL OR json_valid(finding)),
  person_id TEXT NOT NULL REFERENCES people (id),
  created_at TEXT NOT NULL,
  lifted_at TEXT,
  lifted_by TEXT REFERENCES people (id),
  UNIQUE (person_id, client_id),
  CHECK (to_frame >= from_frame)
) STRICT;
CREATE INDEX flags_by_take ON flags (take_id);

CREATE TABLE waivers (
  id TEXT PRIMARY KEY,
  client_id TEXT NOT NULL,
  take_id TEXT NOT NULL REFERENCES takes (id) ON DELETE CASCADE,
  finding TEXT NOT NULL CHECK (json_valid(finding)),
  reason TEXT NOT NULL CHECK (length(reason) >= 1),
  person_id TEXT NOT NULL REFERENCES people (id),
  created_at TEXT NOT NULL,
  lifted_at TEXT,
  lifted_by TEXT REFERENCES people (id),
  UNIQUE (person_id, client_id)
) STRICT;
CREATE INDEX waivers_by_take ON waivers (take_id);

CREATE TABLE threads (
  id TEXT PRIMARY KEY,
  client_id TEXT NOT NULL,
  shot_id TEXT NOT NULL REFERENCES shots (id) ON DELETE CASCADE,
  take_id TEXT REFERENCES takes (id) ON DELETE CASCADE,
  from_frame INTEGER,
  to_frame INTEGER,
  person_id TEXT NOT NULL REFERENCES people (id),
  created_at TEXT NOT NULL,
  settled_at TEXT,
  settled_by TEXT REFERENCES people (id),
  UNIQUE (person_id, client_id),
  CHECK (take_id IS NOT NULL OR from_frame IS NOT NULL),
  CHECK ((from_frame IS NULL) = (to_frame IS NULL)),
  CHECK (from_frame IS NULL OR to_frame >= from_frame)
) STRICT;
CREATE INDEX threads_by_shot ON threads (shot_id, settled_at);
CREATE INDEX threads_by_take ON threads (take_id);

CREATE TABLE comments (
  id TEXT PRIMARY KEY,
  client_id TEXT NOT NULL,
  thread_id TEXT NOT NULL REFERENCES threads (id) ON DELETE CASCADE,
  event_number INTEGER NOT NULL,
  body TEXT NOT NULL CHECK (length(body) >= 1),
  person_id TEXT NOT NULL REFERENCES people (id),
  created_at TEXT NOT NULL,
  UNIQUE (person_id, client_id)
) STRICT;
CREATE INDEX comments_by_thread ON comments (thread_id, event_number);

CREATE TABLE rulings (
  id TEXT PRIMARY KEY,
  client_id TEXT NOT NULL,
  -- A take is ruled on once.
  take_id TEXT NOT NULL UNIQUE REFERENCES takes (id) ON DELETE CASCADE,
  decision TEXT NOT NULL CHECK (decision IN ('stands', 'stands-with-notes', 'goes-back')),
  note TEXT NOT NULL DEFAULT '',
  person_id TEXT NOT NULL REFERENCES people (id),
  created_at TEXT NOT NULL,
  reopened_at TEXT,
  reopened_by TEXT REFERENCES people (id),
  reopened_reason TEXT,
  UNIQUE (person_id, client_id),
  CHECK ((reopened_at IS NULL) = (reopened_by IS NULL))
) STRICT;

CREATE TABLE events (
  production_id TEXT NOT NULL REFERENCES productions (id) ON DELETE CASCADE,
  n INTEGER NOT NULL CHECK (n >= 1),
  kind TEXT NOT NULL,
  shot_id TEXT REFERENCES shots (id) ON DELETE CASCADE,
  person_id TEXT REFERENCES people (id) ON DELETE SET NULL,
  take_number INTEGER,
  comment_id TEXT REFERENCES comments (id) ON DELETE CASCADE,
  created_at TEXT NOT NULL,
  PRIMARY KEY (production_id, n)
) STRICT;

CREATE TABLE letters (
  id TEXT PRIMARY KEY,
  kind TEXT NOT NULL CHECK (kind IN ('ruling', 'invitation', 'reset')),
  ruling_id TEXT REFERENCES rulings (id) ON DELETE CASCADE,
  link_id TEXT REFERENCES links (id) ON DELETE CASCADE,
  -- Null for an invitation: nobody is there yet.
  person_id TEXT REFERENCES people (id) ON DELETE CASCADE,
  to_address TEXT NOT NULL,
  to_name TEXT NOT NULL,
  message_id TEXT NOT NULL UNIQUE,
  -- The Message-ID that letters on one shot thread under.
  thread_message_id TEXT,
  subject TEXT NOT NULL,
  text TEXT NOT NULL,
  html TEXT NOT NULL,
  -- A one-use link, sealed with the session secret and wiped once the letter has gone.
  sealed_link TEXT,
  state TEXT NOT NULL DEFAULT 'waiting' CHECK (state IN ('waiting', 'sending', 'sent', 'parked', 'dropped')),
  attempts INTEGER NOT NULL DEFAULT 0 CHECK (attempts >= 0),
  next_at TEXT,
  lease_until TEXT,
  lease_by TEXT,
  last_error TEXT,
  sent_at TEXT,
  created_at TEXT NOT NULL,
  UNIQUE (ruling_id, person_id),
  CHECK ((kind = 'ruling') = (ruling_id IS NOT NULL)),
  CHECK ((state = 'sending') = (lease_until IS NOT NULL))
) STRICT;
CREATE INDEX letters_due ON letters (state, next_at);
CREATE INDEX letters_newest ON letters (created_at, id);
