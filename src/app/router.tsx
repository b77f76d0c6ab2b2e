import { createBrowserRouter, type RouteObject } from 'react-router-dom';
import { paths } from './paths.ts';
import { FailedPage } from './routes/failed.tsx';
import { Component as SiteLayout, NotFoundPage } from './routes/site-layout.tsx';

type Screen = { Component: () => React.ReactNode };

/** A screen is fetched when it is first opened; its failure stays inside the frame. */
function screen(pattern: string, load: () => Promise<Screen>): RouteObject {
  return {
    path: pattern,
    ErrorBoundary: FailedPage,
    lazy: async () => {
      const { Component } = await load();
      return { Component };
    },
  };
}

const screens: RouteObject[] = [
  screen(paths.today.pattern, () => import('./routes/today.tsx')),
  screen(paths.equipment.pattern, () => import('./routes/equipment.tsx')),
  screen(paths.instrument.pattern, () => import('./routes/instrument.tsx')),
  screen(paths.board.pattern, () => import('./routes/board.tsx')),
  screen(paths.requests.pattern, () => import('./routes/requests.tsx')),
  screen(paths.bookings.pattern, () => import('./routes/bookings.tsx')),
  screen(paths.booking.pattern, () => import('./routes/booking.tsx')),
  screen(paths.load.pattern, () => import('./routes/load.tsx')),
  screen(paths.metrology.pattern, () => import('./routes/metrology.tsx')),
  screen(paths.newCalibration.pattern, () => import('./routes/new-calibration.tsx')),
  screen(paths.calibration.pattern, () => import('./routes/calibration.tsx')),
  screen(paths.settings.pattern, () => import('./routes/settings.tsx')),
  screen(paths.help.pattern, () => import('./routes/help.tsx')),
  screen(paths.marks.pattern, () => import('./routes/marks.tsx')),
  screen(paths.newRequest.pattern, () => import('./routes/new-request.tsx')),
  screen(paths.editRequest.pattern, () => import('./routes/edit-request.tsx')),
  screen(paths.request.pattern, () => import('./routes/request.tsx')),
  screen(paths.find.pattern, () => import('./routes/find.tsx')),
];

export function createRouter() {
  return createBrowserRouter([
    {
      ErrorBoundary: FailedPage,
      HydrateFallback: () => null,
      children: [
        screen(paths.signIn.pattern, () => import('./routes/sign-in.tsx')),
        { path: '/', Component: SiteLayout },
        {
          Component: SiteLayout,
          path: '/:site',
          children: [...screens, { path: '*', Component: NotFoundPage }],
        },
      ],
    },
  ]);
}
