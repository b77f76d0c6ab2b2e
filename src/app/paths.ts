/** Every screen's pattern and the way to build its address, in one place. */
const siteRoot = '/:site';

export const paths = {
  signIn: { pattern: '/sign-in', href: () => '/sign-in' },
  today: { pattern: siteRoot, href: (site: string) => `/${site}` },
  board: { pattern: `${siteRoot}/board`, href: (site: string) => `/${site}/board` },
  requests: { pattern: `${siteRoot}/requests`, href: (site: string) => `/${site}/requests` },
  newRequest: {
    pattern: `${siteRoot}/requests/new`,
    href: (site: string) => `/${site}/requests/new`,
  },
  request: {
    pattern: `${siteRoot}/requests/:id`,
    href: (site: string, id: number) => `/${site}/requests/${id}`,
  },
  editRequest: {
    pattern: `${siteRoot}/requests/:id/edit`,
    href: (site: string, id: number) => `/${site}/requests/${id}/edit`,
  },
  bookings: { pattern: `${siteRoot}/bookings`, href: (site: string) => `/${site}/bookings` },
  booking: {
    pattern: `${siteRoot}/bookings/:id`,
    href: (site: string, id: number) => `/${site}/bookings/${id}`,
  },
  load: {
    pattern: `${siteRoot}/loads/:id`,
    href: (site: string, id: number) => `/${site}/loads/${id}`,
  },
  equipment: { pattern: `${siteRoot}/equipment`, href: (site: string) => `/${site}/equipment` },
  instrument: {
    pattern: `${siteRoot}/equipment/:tag`,
    href: (site: string, tag: string) => `/${site}/equipment/${tag}`,
  },
  metrology: { pattern: `${siteRoot}/metrology`, href: (site: string) => `/${site}/metrology` },
  calibration: {
    pattern: `${siteRoot}/metrology/calibrations/:id`,
    href: (site: string, id: number) => `/${site}/metrology/calibrations/${id}`,
  },
  newCalibration: {
    pattern: `${siteRoot}/metrology/calibrations/new`,
    href: (site: string, tag?: string) =>
      `/${site}/metrology/calibrations/new${tag === undefined ? '' : `?tag=${tag}`}`,
  },
  settings: { pattern: `${siteRoot}/settings`, href: (site: string) => `/${site}/settings` },
  find: { pattern: `${siteRoot}/find`, href: (site: string) => `/${site}/find` },
  help: { pattern: `${siteRoot}/help`, href: (site: string) => `/${site}/help` },
  marks: { pattern: `${siteRoot}/help/marks`, href: (site: string) => `/${site}/help/marks` },
} as const;
