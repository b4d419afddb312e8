/**
 * What the application's role may do, table by table and column by column; all else is refused. Nothing is deleted and nothing emptied:
 * what ends is marked as ended. Sessions, tries to sign in and the record's heads are reached through functions only.
 */
export const tableGrants: Readonly<Record<string, readonly string[]>> = {
  plants: ['SELECT'],
  users: ['SELECT (id, mail, name)'],
  memberships: ['SELECT', 'INSERT', 'UPDATE (role, may_approve, ended_at, version)'],
  machines: ['SELECT', 'INSERT', 'UPDATE (version, block_unit, block_header, block_footer)'],
  machine_revisions: ['SELECT', 'INSERT'],
  grades: ['SELECT', 'INSERT'],
  nozzles: ['SELECT', 'INSERT'],
  house_rules: ['SELECT', 'INSERT', 'UPDATE (expression, sentence, blocks, ended_at, version, changed_by, changed_at)'],
  rates: [
    'SELECT',
    `UPDATE (currency, machine_hour, oxygen_kilogram, electricity_kilowatt_hour, wall_plug_efficiency, version, changed_by,
      changed_at)`,
  ],
  strategies: ['SELECT', 'INSERT', 'UPDATE (version)'],
  strategy_revisions: [
    'SELECT',
    'INSERT',
    `UPDATE (state, version, content, machine_id, machine_revision_id, grade_group, gas, nozzle_id, thickness_min, thickness_max,
      hottest_plate, prediction, model_version, core, house_rules, changed_at, changed_by)`,
  ],
  revision_authors: ['SELECT', 'INSERT'],
  reviews: ['SELECT', 'INSERT'],
  approvals: ['SELECT', 'INSERT', 'UPDATE (ended_at, ended_by, ended_why)'],
  plates: [
    'SELECT',
    'INSERT',
    `UPDATE (tag, grade_id, heat_number, nominal_thickness, measured_thickness, surface, certificate, length, width, version,
      changed_at, changed_by)`,
  ],
  requests: ['SELECT', 'INSERT'],
  parts: ['SELECT', 'INSERT'],
  layouts: ['SELECT', 'INSERT', 'UPDATE (name, version, changed_at, changed_by)'],
  layout_versions: ['SELECT', 'INSERT'],
  placements: ['SELECT', 'INSERT'],
  corner_plans: [
    'SELECT',
    'INSERT',
    `UPDATE (revision_id, layout_version, thickness, plate_temperature, skeleton, overrides, temperature_limit, corners, totals, version,
      changed_at, changed_by)`,
  ],
  reports: ['SELECT', 'INSERT', 'UPDATE (closed_at, closed_by, closed_words, version)'],
  files: ['SELECT', 'INSERT'],
  idempotency_keys: ['SELECT', 'INSERT', 'UPDATE (fingerprint, status, answer_version, answer, at)'],
  record: ['SELECT', 'INSERT (plant_id, actor_id, event, subject_kind, subject_id, facts)'],
  record_heads: ['SELECT'],
};

export const functionGrants: readonly string[] = [
  'sign_in_begin(text, text, integer, integer, integer)',
  'sign_in_account(text)',
  'sign_in_open(uuid, text, text, integer)',
  'session_actor(text)',
  'session_memberships(text)',
  'session_end(text)',
  'session_move(text, uuid, text)',
  'account_for(uuid, text, text, text)',
  'stray_file_keys(text[])',
  'sweep_expired(integer, integer)',
];
