/** Each page's address once: `pattern` for the router, `to` for links. */
function page<Arguments extends unknown[]>(pattern: string, to: (...given: Arguments) => string) {
  return { pattern, to };
}
const fixed = (pattern: string) => page(pattern, () => pattern);

export const paths = {
  home: fixed('/'),
  signIn: page('/sign-in', (from?: string) =>
    from ? `/sign-in?from=${encodeURIComponent(from)}` : '/sign-in',
  ),
  fleet: fixed('/fleet'),
  myVessel: fixed('/my-vessel'),
  portfolio: fixed('/portfolio'),
  administration: fixed('/administration'),
  profile: fixed('/profile'),
  reference: fixed('/reference'),
  addCurve: fixed('/reference/curves/new'),
  reviseCurve: page(
    '/reference/curves/:curveId/correct',
    (curveId: string) => `/reference/curves/${encodeURIComponent(curveId)}/correct`,
  ),
  addConstruction: fixed('/reference/constructions/new'),
  reviseConstruction: page(
    '/reference/constructions/:constructionId/correct',
    (constructionId: string) => `/reference/constructions/${encodeURIComponent(constructionId)}/correct`,
  ),
  help: fixed('/help'),
  curve: page(
    '/reference/curves/:curveId',
    (curveId: string) => `/reference/curves/${encodeURIComponent(curveId)}`,
  ),
  registerVessel: fixed('/vessels/new'),
  vessel: page('/vessels/:vesselId', (vesselId: string) => `/vessels/${vesselId}`),
  editVessel: page('/vessels/:vesselId/edit', (vesselId: string) => `/vessels/${vesselId}/edit`),
  usagePlan: page('/vessels/:vesselId/usage-plan', (vesselId: string) => `/vessels/${vesselId}/usage-plan`),
  addPosition: page(
    '/vessels/:vesselId/positions/new',
    (vesselId: string) => `/vessels/${vesselId}/positions/new`,
  ),
  editPosition: page(
    '/vessels/:vesselId/positions/:positionId/edit',
    (vesselId: string, positionId: string) => `/vessels/${vesselId}/positions/${positionId}/edit`,
  ),
  startRig: page('/vessels/:vesselId/rig/start', (vesselId: string) => `/vessels/${vesselId}/rig/start`),
  rigGeometry: page(
    '/vessels/:vesselId/rig/geometry',
    (vesselId: string) => `/vessels/${vesselId}/rig/geometry`,
  ),
  sisterVessel: page('/vessels/:vesselId/sister', (vesselId: string) => `/vessels/${vesselId}/sister`),
  sensors: page('/vessels/:vesselId/sensors', (vesselId: string) => `/vessels/${vesselId}/sensors`),
  addSensor: page('/vessels/:vesselId/sensors/new', (vesselId: string) => `/vessels/${vesselId}/sensors/new`),
  editSensor: page(
    '/vessels/:vesselId/sensors/:sensorId/edit',
    (vesselId: string, sensorId: string) => `/vessels/${vesselId}/sensors/${sensorId}/edit`,
  ),
  sensorEvent: page(
    '/vessels/:vesselId/sensors/:sensorId/check',
    (vesselId: string, sensorId: string) => `/vessels/${vesselId}/sensors/${sensorId}/check`,
  ),
  positionHistory: page(
    '/positions/:positionId/history',
    (positionId: string) => `/positions/${positionId}/history`,
  ),
  fitPart: page(
    '/vessels/:vesselId/positions/:positionId/fit',
    (vesselId: string, positionId: string) => `/vessels/${vesselId}/positions/${positionId}/fit`,
  ),
  /** The Loads tab of the vessel page. */
  loadLogs: page('/vessels/:vesselId/load-logs', (vesselId: string) => `/vessels/${vesselId}/load-logs`),
  addLoadLog: page(
    '/vessels/:vesselId/load-logs/new',
    (vesselId: string) => `/vessels/${vesselId}/load-logs/new`,
  ),
  loadLog: page('/load-logs/:loadLogId', (loadLogId: string) => `/load-logs/${loadLogId}`),
  ledgerCheck: page(
    '/vessels/:vesselId/ledger-check',
    (vesselId: string) => `/vessels/${vesselId}/ledger-check`,
  ),
  /** The Re-rig schedule tab of the vessel page. */
  rerigSchedule: page(
    '/vessels/:vesselId/rerig-schedule',
    (vesselId: string) => `/vessels/${vesselId}/rerig-schedule`,
  ),
  yardTerms: fixed('/yard-terms'),
  part: page('/parts/:partId', (partId: string) => `/parts/${partId}`),
  partDetails: page('/parts/:partId/details', (partId: string) => `/parts/${partId}/details`),
  changeDetail: page(
    '/parts/:partId/details/:detailKey',
    (partId: string, detailKey: string) => `/parts/${partId}/details/${detailKey}`,
  ),
  editPart: page('/parts/:partId/edit', (partId: string) => `/parts/${partId}/edit`),
  removePart: page('/parts/:partId/remove', (partId: string) => `/parts/${partId}/remove`),
} as const;
