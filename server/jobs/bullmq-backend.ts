import { createPostgresBackend, createRedisBackend, Queue, Worker } from 'bullmq';
import type { BackendFactory, IQueueBackend, Job } from 'bullmq';
import { Redis } from 'ioredis';
import { queueSchema } from '#server/db/migrate-database.ts';

const queueName = 'millpond';

export type WorkOptions = {
  readonly concurrency: number;
  /** How long a job belongs to a worker that gives no sign of life. */
  readonly lockMs: number;
};
type Run = (job: Job) => Promise<void>;

type Opened<Connection> = { readonly connection: Connection; readonly end: () => Promise<void> };

function overStore<Backend extends IQueueBackend, Connection>(
  factory: BackendFactory<Backend, Connection>,
  store: {
    readonly forQueue: () => Opened<Connection>;
    readonly forWorker: () => Opened<Connection>;
  },
) {
  return {
    openQueue() {
      const { connection, end } = store.forQueue();
      return { queue: new Queue(queueName, { connection, prefix: queueName }, factory), end };
    },
    openWorker(run: Run, options: WorkOptions) {
      const { connection, end } = store.forWorker();
      const worker = new Worker(
        queueName,
        run,
        {
          connection,
          prefix: queueName,
          autorun: false,
          concurrency: options.concurrency,
          lockDuration: options.lockMs,
          stalledInterval: options.lockMs,
          // A worker that is killed leaves its job behind; the job is not to blame, so it gets many lives.
          maxStalledCount: 20,
        },
        factory,
      );
      return { worker, end };
    },
  };
}

export type BackendOptions = {
  readonly databaseUrl: string;
  readonly redisUrl: string | null;
  /** Told when the connection to Redis breaks; it is opened again by itself. */
  readonly onConnectionError: (error: Error) => void;
};

/** PostgreSQL carries the queue, in a schema of its own, unless Redis is named. */
export function openBullmqBackend(options: BackendOptions) {
  return options.redisUrl === null
    ? overPostgres(options.databaseUrl)
    : overRedis(options.redisUrl, options.onConnectionError);
}

function overPostgres(databaseUrl: string) {
  function open(max: number) {
    const connection = {
      connectionString: databaseUrl,
      schema: queueSchema,
      max,
      application_name: 'millpond-queue',
      connectionTimeoutMillis: 10_000,
      statement_timeout: 60_000,
      options: '-c timezone=UTC',
    };
    // The pool is made from this and ended by the program that uses it.
    return { connection, end: () => Promise.resolve() };
  }
  return overStore(createPostgresBackend, { forQueue: () => open(2), forWorker: () => open(5) });
}

function overRedis(url: string, onConnectionError: (error: Error) => void) {
  function open(options: { readonly failsFast: boolean }) {
    // A worker waits for a lost server; who hands a job in must know at once whether it is in.
    const connection = new Redis(url, {
      maxRetriesPerRequest: options.failsFast ? 1 : null,
      ...(options.failsFast ? { commandTimeout: 10_000 } : {}),
    });
    connection.on('error', onConnectionError);
    return {
      connection,
      end: () => {
        connection.disconnect();
        return Promise.resolve();
      },
    };
  }
  return overStore(createRedisBackend, {
    forQueue: () => open({ failsFast: true }),
    forWorker: () => open({ failsFast: false }),
  });
}
