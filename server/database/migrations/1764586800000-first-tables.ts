import type { MigrationInterface, QueryRunner } from 'typeorm';

const KEPT = 'id uuid PRIMARY KEY DEFAULT gen_random_uuid(), created_at timestamptz(3) NOT NULL DEFAULT now()';
const VERSIONED = `${KEPT}, version int NOT NULL, updated_at timestamptz(3) NOT NULL DEFAULT now()`;
const EDITABLE = `${VERSIONED}, deleted_at timestamptz(3)`;
const owned = (column: string, table: string) => `${column} uuid NOT NULL REFERENCES ${table} (id) ON DELETE CASCADE`;
const loose = (column: string, table: string) => `${column} uuid REFERENCES ${table} (id) ON DELETE SET NULL`;
const CREATED_BY = 'created_by_id uuid NOT NULL REFERENCES person (id) ON DELETE NO ACTION';

const PEOPLE = [
  `CREATE TABLE person (${EDITABLE},
    email text NOT NULL UNIQUE, name text NOT NULL, password_hash text NOT NULL, verified_at timestamptz(3),
    preferences jsonb NOT NULL)`,
  `CREATE TABLE session (${KEPT}, ${owned('person_id', 'person')},
    device text NOT NULL, salt text NOT NULL, generation int NOT NULL, rotated_at timestamptz(3) NOT NULL,
    last_used_at timestamptz(3) NOT NULL, expires_at timestamptz(3) NOT NULL, ended_at timestamptz(3))`,
  'CREATE INDEX session_person_id_idx ON session (person_id)',
  `CREATE TABLE mail_code (${KEPT}, ${owned('person_id', 'person')},
    purpose text NOT NULL CONSTRAINT mail_code_purpose_check CHECK (purpose IN ('verify', 'reset')),
    code_sha256 char(64) NOT NULL UNIQUE, expires_at timestamptz(3) NOT NULL, used_at timestamptz(3))`,
  'CREATE INDEX mail_code_person_id_idx ON mail_code (person_id)',
  `CREATE TABLE team (${EDITABLE}, name text NOT NULL, rules jsonb NOT NULL)`,
  `CREATE TABLE membership (${VERSIONED}, ${owned('team_id', 'team')}, ${owned('person_id', 'person')},
    role text NOT NULL CONSTRAINT membership_role_check CHECK (role IN ('owner', 'lead', 'member', 'viewer')),
    UNIQUE (team_id, person_id))`,
  'CREATE INDEX membership_person_id_idx ON membership (person_id)',
  `CREATE TABLE notice (${KEPT}, ${owned('person_id', 'person')},
    team_id uuid REFERENCES team (id) ON DELETE CASCADE,
    kind text NOT NULL, subject jsonb NOT NULL, read_at timestamptz(3))`,
  'CREATE INDEX notice_person_id_created_at_id_idx ON notice (person_id, created_at, id)',
  'CREATE INDEX notice_team_id_idx ON notice (team_id)',
  'CREATE TABLE rate_limit (key text PRIMARY KEY, points int NOT NULL, expire bigint)',
];

const PROJECTS = [
  `CREATE TABLE project (${EDITABLE}, ${owned('team_id', 'team')},
    name text NOT NULL, note text NOT NULL, is_invented boolean NOT NULL, ${CREATED_BY})`,
  'CREATE INDEX project_team_id_created_at_id_idx ON project (team_id, created_at, id)',
  'CREATE INDEX project_created_by_id_idx ON project (created_by_id)',
  `CREATE TABLE item (${EDITABLE}, ${owned('project_id', 'project')},
    kind text NOT NULL CONSTRAINT item_kind_check CHECK (kind IN ('driver', 'box', 'part', 'jig')),
    name text NOT NULL, serial text NOT NULL, note text NOT NULL, published jsonb NOT NULL)`,
  'CREATE INDEX item_project_id_created_at_id_idx ON item (project_id, created_at, id)',
  `CREATE TABLE sheet (${EDITABLE}, ${owned('project_id', 'project')}, name text NOT NULL, content jsonb NOT NULL)`,
  'CREATE INDEX sheet_project_id_created_at_id_idx ON sheet (project_id, created_at, id)',
];

const SWEEPS = [
  `CREATE TABLE source_file (${KEPT}, ${owned('project_id', 'project')},
    file_name text NOT NULL, bytes int NOT NULL, sha256 char(64) NOT NULL, ${CREATED_BY},
    UNIQUE (project_id, sha256))`,
  'CREATE INDEX source_file_created_by_id_idx ON source_file (created_by_id)',
  `CREATE TABLE source_chunk (${owned('source_file_id', 'source_file')}, position int NOT NULL,
    content bytea NOT NULL, PRIMARY KEY (source_file_id, position))`,
  `CREATE TABLE sweep (${EDITABLE}, ${owned('project_id', 'project')}, ${loose('item_id', 'item')},
    ${owned('source_file_id', 'source_file')}, batch_id uuid NOT NULL, name text NOT NULL, conditions jsonb NOT NULL,
    group_name text NOT NULL, tags text[] NOT NULL, newest_revision int NOT NULL)`,
  'CREATE INDEX sweep_project_id_created_at_id_idx ON sweep (project_id, created_at, id)',
  'CREATE INDEX sweep_project_id_batch_id_idx ON sweep (project_id, batch_id)',
  'CREATE INDEX sweep_item_id_idx ON sweep (item_id)',
  'CREATE INDEX sweep_source_file_id_idx ON sweep (source_file_id)',
  'CREATE UNIQUE INDEX sweep_source_file_live_key ON sweep (source_file_id) WHERE deleted_at IS NULL',
  `CREATE TABLE sweep_revision (${KEPT}, ${owned('sweep_id', 'sweep')}, number int NOT NULL,
    overrides jsonb NOT NULL, reading jsonb NOT NULL, findings jsonb NOT NULL, has_phase boolean NOT NULL,
    points int NOT NULL, min_frequency_hz float8 NOT NULL, max_frequency_hz float8 NOT NULL,
    points_sha256 char(64) NOT NULL, ${CREATED_BY}, UNIQUE (sweep_id, number))`,
  'CREATE INDEX sweep_revision_created_by_id_idx ON sweep_revision (created_by_id)',
  `CREATE TABLE sweep_points (
    revision_id uuid PRIMARY KEY REFERENCES sweep_revision (id) ON DELETE CASCADE, content bytea NOT NULL)`,
  // Points and file rows are already dense: compressing them again only costs time.
  'ALTER TABLE sweep_points ALTER COLUMN content SET STORAGE EXTERNAL',
  'ALTER TABLE source_chunk ALTER COLUMN content SET STORAGE EXTERNAL',
];

const CALCULATIONS = [
  `CREATE TABLE setup (${EDITABLE}, ${owned('team_id', 'team')}, name text NOT NULL, calculator_id text NOT NULL)`,
  'CREATE INDEX setup_team_id_created_at_id_idx ON setup (team_id, created_at, id)',
  'CREATE UNIQUE INDEX setup_team_id_name_live_key ON setup (team_id, name) WHERE deleted_at IS NULL',
  `CREATE TABLE setup_version (${KEPT}, ${owned('setup_id', 'setup')}, number int NOT NULL,
    calculator_id text NOT NULL, calculator_version int NOT NULL, settings jsonb NOT NULL,
    settings_version int NOT NULL, note text NOT NULL, ${CREATED_BY}, UNIQUE (setup_id, number))`,
  'CREATE INDEX setup_version_created_by_id_idx ON setup_version (created_by_id)',
  `CREATE TABLE limit_set (${EDITABLE}, ${owned('team_id', 'team')}, name text NOT NULL)`,
  'CREATE INDEX limit_set_team_id_created_at_id_idx ON limit_set (team_id, created_at, id)',
  'CREATE UNIQUE INDEX limit_set_team_id_name_live_key ON limit_set (team_id, name) WHERE deleted_at IS NULL',
  `CREATE TABLE limit_version (${KEPT}, ${owned('limit_set_id', 'limit_set')}, number int NOT NULL,
    content jsonb NOT NULL, note text NOT NULL, ${CREATED_BY}, UNIQUE (limit_set_id, number))`,
  'CREATE INDEX limit_version_created_by_id_idx ON limit_version (created_by_id)',
  `CREATE TABLE result (${EDITABLE}, ${owned('project_id', 'project')}, ${loose('sheet_id', 'sheet')},
    ${loose('item_id', 'item')}, name text NOT NULL, calculator_id text NOT NULL, calculator_version int NOT NULL,
    settings jsonb NOT NULL, settings_version int NOT NULL,
    setup_version_id uuid REFERENCES setup_version (id) ON DELETE NO ACTION, seed int NOT NULL,
    inputs jsonb NOT NULL, output jsonb NOT NULL, inputs_sha256 char(64) NOT NULL, ${CREATED_BY})`,
  'CREATE INDEX result_project_id_created_at_id_idx ON result (project_id, created_at, id)',
  'CREATE INDEX result_sheet_id_idx ON result (sheet_id)',
  'CREATE INDEX result_item_id_idx ON result (item_id)',
  'CREATE INDEX result_setup_version_id_idx ON result (setup_version_id)',
  'CREATE INDEX result_created_by_id_idx ON result (created_by_id)',
];

const HISTORY = [
  `CREATE TABLE activity (chain_id uuid NOT NULL, sequence int NOT NULL, at timestamptz(3) NOT NULL, actor_id uuid,
    action text NOT NULL, entity text NOT NULL, entity_id uuid NOT NULL, entity_version int NOT NULL,
    change text NOT NULL CONSTRAINT activity_change_check CHECK (change IN ('made', 'changed', 'deleted', 'restored')),
    project_id uuid, "from" jsonb, "to" jsonb, previous_hash char(64) NOT NULL, hash char(64) NOT NULL,
    PRIMARY KEY (chain_id, sequence))`,
  'CREATE INDEX activity_project_id_sequence_idx ON activity (project_id, sequence)',
  'CREATE INDEX activity_entity_id_idx ON activity (entity_id)',
  'CREATE TABLE activity_head (chain_id uuid PRIMARY KEY, sequence int NOT NULL, hash char(64) NOT NULL)',
];

const TABLES = [
  ['activity_head', 'activity', 'result', 'limit_version', 'limit_set', 'setup_version', 'setup'],
  ['sweep_points', 'sweep_revision', 'sweep', 'source_chunk', 'source_file', 'sheet', 'item', 'project'],
  ['rate_limit', 'notice', 'membership', 'team', 'mail_code', 'session', 'person'],
].flat();

/** Everything from an account to a kept result. */
export class FirstTables1764586800000 implements MigrationInterface {
  name = 'FirstTables1764586800000';
  async up(db: QueryRunner): Promise<void> {
    for (const statement of [...PEOPLE, ...PROJECTS, ...SWEEPS, ...CALCULATIONS, ...HISTORY]) await db.query(statement);
  }
  async down(db: QueryRunner): Promise<void> {
    for (const table of TABLES) await db.query(`DROP TABLE ${table}`);
  }
}
