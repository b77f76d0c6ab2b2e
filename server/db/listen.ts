import pg from 'pg';

export type Listening = { close(): Promise<void> };

export type ListenOptions = {
  readonly url: string;
  readonly channel: string;
  /** Called for every notice, and after each connect, since notices may have been missed before. */
  readonly onNotice: (payload: string) => void;
  readonly onLost: (error: Error) => void;
};

const firstPauseMs = 500;
const longestPauseMs = 15_000;

/** Listens to a PostgreSQL channel on a connection of its own, and connects again when that breaks. */
export function listenTo(options: ListenOptions): Listening {
  let isClosed = false;
  let client: pg.Client | null = null;
  let pauseMs = firstPauseMs;
  let timer: NodeJS.Timeout | undefined;

  async function connect(): Promise<void> {
    const fresh = new pg.Client({
      connectionString: options.url,
      application_name: 'millpond-listen',
      connectionTimeoutMillis: 10_000,
      keepAlive: true,
    });
    client = fresh;
    let isLost = false;
    const lose = (error: Error): void => {
      if (isLost || isClosed) {
        return;
      }
      isLost = true;
      options.onLost(error);
      fresh.end().catch(() => {
        // Already broken: there is nothing left to end.
      });
      timer = setTimeout(() => void connect(), pauseMs);
      pauseMs = Math.min(pauseMs * 2, longestPauseMs);
    };
    fresh.on('error', lose);
    fresh.on('end', () => {
      lose(new Error('The database ended the connection.'));
    });
    fresh.on('notification', ({ payload }) => {
      options.onNotice(payload ?? '');
    });
    try {
      await fresh.connect();
      await fresh.query(`listen ${pg.escapeIdentifier(options.channel)}`);
      pauseMs = firstPauseMs;
      options.onNotice('');
    } catch (error) {
      lose(error instanceof Error ? error : new Error(String(error)));
    }
  }

  const connecting = connect();
  return {
    async close() {
      isClosed = true;
      clearTimeout(timer);
      await connecting;
      await client?.end();
    },
  };
}
