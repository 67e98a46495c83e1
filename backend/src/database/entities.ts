import { AuditEvent } from '../audit/audit-event.entity.js';
import { SessionRow } from '../auth/session-row.entity.js';
import { SignInAttempt } from '../auth/sign-in-attempt.entity.js';
import { IdempotencyKey } from '../common/idempotency/idempotency-key.entity.js';
import { Construction } from '../constructions/construction.entity.js';
import { Curve } from '../curves/curve.entity.js';
import { Firm } from '../firms/firm.entity.js';
import { Membership } from '../firms/membership.entity.js';
import { Job } from '../jobs/job.entity.js';
import { LedgerEntry } from '../ledger/ledger-entry.entity.js';
import { DetailChoice } from '../life/detail-choice.entity.js';
import { PartDetail } from '../life/part-detail.entity.js';
import { PartStanding } from '../life/part-standing.entity.js';
import { UsagePlan } from '../life/usage-plan.entity.js';
import { ChannelMapping } from '../load-logs/channel-mapping.entity.js';
import { LoadLog } from '../load-logs/load-log.entity.js';
import { StoredSpectrum } from '../load-logs/load-spectrum.entity.js';
import { LogChannel } from '../load-logs/log-channel.entity.js';
import { FittedPart } from '../parts/fitted-part.entity.js';
import { RerigPlan } from '../rerig-schedules/rerig-plan.entity.js';
import { RerigRequest } from '../rerig-schedules/rerig-request.entity.js';
import { RerigSchedule } from '../rerig-schedules/rerig-schedule.entity.js';
import { YardTermsRow } from '../rerig-schedules/yard-terms.entity.js';
import { Position } from '../rig/position.entity.js';
import { RigGeometryRow } from '../rig/rig-geometry.entity.js';
import { SensorEvent } from '../sensors/sensor-event.entity.js';
import { Sensor } from '../sensors/sensor.entity.js';
import { User } from '../users/user.entity.js';
import { VesselAccess } from '../vessels/vessel-access.entity.js';
import { VesselStanding } from '../vessels/vessel-standing.entity.js';
import { Vessel } from '../vessels/vessel.entity.js';
import { ServiceSetting } from './service-setting.entity.js';

/** Every table of the service. `npm run db:check` compares this list with the migrated schema. */
export const ENTITIES = [
  AuditEvent,
  ChannelMapping,
  Construction,
  Curve,
  DetailChoice,
  Firm,
  FittedPart,
  IdempotencyKey,
  Job,
  LedgerEntry,
  LoadLog,
  LogChannel,
  Membership,
  PartDetail,
  PartStanding,
  Position,
  RerigPlan,
  RerigRequest,
  RerigSchedule,
  RigGeometryRow,
  Sensor,
  SensorEvent,
  ServiceSetting,
  SessionRow,
  SignInAttempt,
  StoredSpectrum,
  UsagePlan,
  User,
  Vessel,
  VesselAccess,
  VesselStanding,
  YardTermsRow,
];
