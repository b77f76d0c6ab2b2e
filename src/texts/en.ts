import { board } from './en/board.ts';
import { bookings } from './en/bookings.ts';
import { drawings } from './en/drawings.ts';
import { equipment } from './en/equipment.ts';
import { gallery } from './en/gallery.ts';
import { help } from './en/help.ts';
import { layout } from './en/layout.ts';
import { metrology } from './en/metrology.ts';
import { requests } from './en/requests.ts';
import { request } from './en/request.ts';
import { session } from './en/session.ts';
import { settings } from './en/settings.ts';
import { shell } from './en/shell.ts';
import { today } from './en/today.ts';
import { ui } from './en/ui.ts';

/** Every word the client shows; a feature adds one file in `en/` and one line here. */
export const en = {
  board,
  bookings,
  drawings,
  equipment,
  gallery,
  help,
  layout,
  metrology,
  request,
  requests,
  session,
  settings,
  shell,
  today,
  ui,
} as const;
