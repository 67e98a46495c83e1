import type { ComponentType } from 'react';
import { createBrowserRouter, Navigate, type RouteObject } from 'react-router-dom';
import { LoadingState } from '../components/feedback/loading-state';
import { NotFoundPage } from '../pages/not-found/not-found.page';
import { SignInPage } from '../pages/sign-in/sign-in.page';
import { LandingRedirect } from './landing-redirect';
import { paths } from './paths';
import { RouteErrorPage } from './route-error.page';
import { ShellLayout } from './shell-layout';
import { SignedInGate } from './signed-in-gate';

/** A page in a chunk of its own, loaded when its address is first opened; a fault in it leaves the shell standing. */
function lazyPage<Module>(
  path: string,
  load: () => Promise<Module>,
  pick: (module: Module) => ComponentType,
  children?: RouteObject[],
): RouteObject {
  return {
    path,
    lazy: async () => ({ Component: pick(await load()) }),
    errorElement: <RouteErrorPage />,
    children,
  };
}

/** Layout that brings antd's provider: everything below it may use antd. */
const withAntd = (children: RouteObject[]): RouteObject => ({
  lazy: async () => ({ Component: (await import('./antd-scope')).AntdScope }),
  errorElement: <RouteErrorPage />,
  children,
});

/** Pages without antd: light enough for a phone on a poor line. */
const lightPages: RouteObject[] = [
  lazyPage(
    paths.startRig.pattern,
    () => import('../pages/rig/start-rig.page'),
    (module) => module.StartRigPage,
  ),
  lazyPage(
    paths.sisterVessel.pattern,
    () => import('../pages/vessels/sister-vessel.page'),
    (module) => module.SisterVesselPage,
  ),
  lazyPage(
    paths.sensors.pattern,
    () => import('../pages/sensors/sensors.page'),
    (module) => module.SensorsPage,
  ),
  lazyPage(
    paths.help.pattern,
    () => import('../pages/help/help.page'),
    (module) => module.HelpPage,
  ),
  lazyPage(
    paths.reference.pattern,
    () => import('../pages/reference/reference.page'),
    (module) => module.ReferencePage,
  ),
  lazyPage(
    paths.administration.pattern,
    () => import('../pages/administration/administration.page'),
    (module) => module.AdministrationPage,
  ),
  lazyPage(
    paths.curve.pattern,
    () => import('../pages/reference/curve.page'),
    (module) => module.CurvePage,
  ),
  lazyPage(
    paths.myVessel.pattern,
    () => import('../pages/my-vessel/my-vessel.page'),
    (module) => module.MyVesselPage,
  ),
  lazyPage(
    paths.portfolio.pattern,
    () => import('../pages/portfolio/portfolio.page'),
    (module) => module.PortfolioPage,
  ),
  lazyPage(
    paths.fleet.pattern,
    () => import('../pages/vessels/fleet.page'),
    (module) => module.FleetPage,
  ),
  lazyPage(
    paths.vessel.pattern,
    () => import('../pages/vessels/vessel-layout.page'),
    (module) => module.VesselLayoutPage,
    [
      {
        index: true,
        lazy: async () => ({ Component: (await import('../pages/vessels/vessel-rig.page')).VesselRigPage }),
        errorElement: <RouteErrorPage />,
      },
      lazyPage(
        paths.loadLogs.pattern,
        () => import('../pages/load-logs/load-log-list.page'),
        (module) => module.LoadLogListPage,
      ),
      lazyPage(
        paths.rerigSchedule.pattern,
        () => import('../pages/rerig-schedules/rerig-schedule.page'),
        (module) => module.RerigSchedulePage,
      ),
    ],
  ),
  lazyPage(
    paths.yardTerms.pattern,
    () => import('../pages/rerig-schedules/yard-terms.page'),
    (module) => module.YardTermsPage,
  ),
  lazyPage(
    paths.addLoadLog.pattern,
    () => import('../pages/load-logs/add-load-log.page'),
    (module) => module.AddLoadLogPage,
  ),
  lazyPage(
    paths.loadLog.pattern,
    () => import('../pages/load-logs/load-log-review.page'),
    (module) => module.LoadLogReviewPage,
  ),
  lazyPage(
    paths.ledgerCheck.pattern,
    () => import('../pages/ledger/ledger-check.page'),
    (module) => module.LedgerCheckPage,
  ),
  lazyPage(
    paths.positionHistory.pattern,
    () => import('../pages/rig/position-history.page'),
    (module) => module.PositionHistoryPage,
  ),
  lazyPage(
    paths.partDetails.pattern,
    () => import('../pages/parts/part-details.page'),
    (module) => module.PartDetailsPage,
  ),
  lazyPage(
    paths.changeDetail.pattern,
    () => import('../pages/parts/change-detail.page'),
    (module) => module.ChangeDetailPage,
  ),
  lazyPage(
    paths.part.pattern,
    () => import('../pages/parts/part.page'),
    (module) => module.PartPage,
  ),
];

/** Pages with forms. */
const antdPages: RouteObject[] = [
  lazyPage(
    paths.rigGeometry.pattern,
    () => import('../pages/rig/rig-geometry.page'),
    (module) => module.RigGeometryPage,
  ),
  lazyPage(
    paths.addSensor.pattern,
    () => import('../pages/sensors/edit-sensor.page'),
    (module) => module.EditSensorPage,
  ),
  lazyPage(
    paths.editSensor.pattern,
    () => import('../pages/sensors/edit-sensor.page'),
    (module) => module.EditSensorPage,
  ),
  lazyPage(
    paths.sensorEvent.pattern,
    () => import('../pages/sensors/sensor-event.page'),
    (module) => module.SensorEventPage,
  ),
  lazyPage(
    paths.addCurve.pattern,
    () => import('../pages/reference/add-curve.page'),
    (module) => module.AddCurvePage,
  ),
  lazyPage(
    paths.reviseCurve.pattern,
    () => import('../pages/reference/revise-curve.page'),
    (module) => module.ReviseCurvePage,
  ),
  lazyPage(
    paths.addConstruction.pattern,
    () => import('../pages/reference/add-construction.page'),
    (module) => module.AddConstructionPage,
  ),
  lazyPage(
    paths.reviseConstruction.pattern,
    () => import('../pages/reference/revise-construction.page'),
    (module) => module.ReviseConstructionPage,
  ),
  lazyPage(
    paths.registerVessel.pattern,
    () => import('../pages/vessels/register-vessel.page'),
    (module) => module.RegisterVesselPage,
  ),
  lazyPage(
    paths.editVessel.pattern,
    () => import('../pages/vessels/edit-vessel.page'),
    (module) => module.EditVesselPage,
  ),
  lazyPage(
    paths.usagePlan.pattern,
    () => import('../pages/vessels/usage-plan.page'),
    (module) => module.UsagePlanPage,
  ),
  lazyPage(
    paths.addPosition.pattern,
    () => import('../pages/rig/add-position.page'),
    (module) => module.AddPositionPage,
  ),
  lazyPage(
    paths.editPosition.pattern,
    () => import('../pages/rig/edit-position.page'),
    (module) => module.EditPositionPage,
  ),
  lazyPage(
    paths.fitPart.pattern,
    () => import('../pages/rig/fit-part.page'),
    (module) => module.FitPartPage,
  ),
  lazyPage(
    paths.editPart.pattern,
    () => import('../pages/rig/edit-part.page'),
    (module) => module.EditPartPage,
  ),
  lazyPage(
    paths.removePart.pattern,
    () => import('../pages/rig/remove-part.page'),
    (module) => module.RemovePartPage,
  ),
  lazyPage(
    paths.profile.pattern,
    () => import('../pages/profile/profile.page'),
    (module) => module.ProfilePage,
  ),
];

/** The route tree; also used by specs with a router of their own. */
export const routes: RouteObject[] = [
  {
    errorElement: <RouteErrorPage />,
    HydrateFallback: LoadingState,
    children: [
      { path: paths.signIn.pattern, element: <SignInPage /> },
      {
        element: <SignedInGate />,
        children: [
          {
            element: <ShellLayout />,
            errorElement: <RouteErrorPage />,
            children: [
              { path: paths.home.pattern, element: <LandingRedirect /> },
              { path: '/vessels', element: <Navigate to={paths.fleet.pattern} replace /> },
              ...lightPages,
              withAntd(antdPages),
              { path: '*', element: <NotFoundPage /> },
            ],
          },
        ],
      },
    ],
  },
];

export function createAppRouter() {
  return createBrowserRouter(routes);
}
