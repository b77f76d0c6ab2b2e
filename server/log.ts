import { pino } from 'pino';
import type { Logger } from 'pino';

export type Log = Logger;

/** Structured lines on standard output. A line never holds a body, a token or a person's name. */
export function createLog(level: string): Log {
  return pino({ level, base: null, timestamp: pino.stdTimeFunctions.isoTime });
}
