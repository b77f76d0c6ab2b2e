import { auditRoutes } from './features/audit/audit.routes.ts';
import { boardRoutes } from './features/board/board.routes.ts';
import { bookingsRoutes } from './features/bookings/bookings.routes.ts';
import { calibrationsRoutes } from './features/calibrations/calibrations.routes.ts';
import { equipmentRoutes } from './features/equipment/equipment.routes.ts';
import { filesRoutes } from './features/files/files.routes.ts';
import { healthRoutes } from './features/health/health.routes.ts';
import { loadsRoutes } from './features/loads/loads.routes.ts';
import { offersRoutes } from './features/offers/offers.routes.ts';
import { peopleRoutes } from './features/people/people.routes.ts';
import { registersRoutes } from './features/registers/registers.routes.ts';
import { requestsRoutes } from './features/requests/requests.routes.ts';
import { searchRoutes } from './features/search/search.routes.ts';
import { sessionRoutes } from './features/session/session.routes.ts';
import { settingsRoutes } from './features/settings/settings.routes.ts';
import type { Route } from './http/define-route.ts';

/** The routes of every feature; a contract that is missing here fails the completeness test. */
export const allRoutes: readonly Route[] = [
  ...auditRoutes,
  ...boardRoutes,
  ...bookingsRoutes,
  ...calibrationsRoutes,
  ...equipmentRoutes,
  ...filesRoutes,
  ...healthRoutes,
  ...loadsRoutes,
  ...offersRoutes,
  ...peopleRoutes,
  ...registersRoutes,
  ...requestsRoutes,
  ...searchRoutes,
  ...sessionRoutes,
  ...settingsRoutes,
];
