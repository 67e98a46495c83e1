import { Migration20261201120000_first } from './migrations/Migration20261201120000_first.js';
import { Migration20261201130200_register } from './migrations/Migration20261201130200_register.js';
import { Migration20261201130300_own_reference_data } from './migrations/Migration20261201130300_own_reference_data.js';
import { Migration20261201130400_detail_choices } from './migrations/Migration20261201130400_detail_choices.js';
import { Migration20261201130600_rerig_schedules } from './migrations/Migration20261201130600_rerig_schedules.js';

/** All migrations in order. Named here instead of found by a file pattern, so source and build cannot be mixed up. */
export const MIGRATIONS = [
  { name: 'Migration20261201120000_first', class: Migration20261201120000_first },
  { name: 'Migration20261201130200_register', class: Migration20261201130200_register },
  { name: 'Migration20261201130300_own_reference_data', class: Migration20261201130300_own_reference_data },
  { name: 'Migration20261201130400_detail_choices', class: Migration20261201130400_detail_choices },
  { name: 'Migration20261201130600_rerig_schedules', class: Migration20261201130600_rerig_schedules },
];
