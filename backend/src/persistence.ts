/** The door through which the worker uses the database: the ORM, the reach helpers and the entities. */
export { ENTITIES } from './database/entities.js';
export { PersistenceModule } from './database/persistence.module.js';
export { inReach, withAccess, type Reach } from './database/reach.js';
export { Clock, dayIn } from './common/clock/clock.js';
export { ClockModule } from './common/clock/clock.module.js';
export { ConfigModule, ENV } from './config/config.module.js';
export { newId } from './common/ids/new-id.js';
export { Job } from './jobs/job.entity.js';
export { FittedPart } from './parts/fitted-part.entity.js';
export { Position } from './rig/position.entity.js';
export { Vessel } from './vessels/vessel.entity.js';
