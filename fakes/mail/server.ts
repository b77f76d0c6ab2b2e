/**
 * Stand-in for a mail server: takes mail over SMTP, keeps it, and shows it on a page. Strict, so that
 * a malformed message fails where it is made. `GET /__calls` lists what came, `POST /__next` makes the
 * next deliveries fail, stall or answer late, `DELETE /__calls` forgets everything.
 */
import { createServer, type IncomingMessage, type ServerResponse } from 'node:http';
import { setTimeout as wait } from 'node:timers/promises';
import { simpleParser } from 'mailparser';
import { SMTPServer } from 'smtp-server';
import { z } from 'zod';
import { inboxPage, mailPage, missingPage, styleSheet } from './pages.ts';
import { faultOf, MailStore } from './store.ts';

export type MailStandInOptions = {
  readonly smtpPort: number;
  readonly httpPort: number;
  /** Where mails are kept over a restart; null keeps them in memory only. */
  readonly folder: string | null;
};
export type MailStandIn = {
  readonly smtpUrl: string;
  readonly url: string;
  readonly close: () => Promise<void>;
};

/** What the next delivery meets; `afterAccept` takes the mail and then breaks off without a 250. */
const nextSchema = z.discriminatedUnion('kind', [
  z.strictObject({
    kind: z.literal('fail'),
    code: z.int().min(400).max(599).default(451),
    message: z.string().default('try again later'),
  }),
  z.strictObject({ kind: z.literal('late'), milliseconds: z.int().min(0).max(60_000) }),
  z.strictObject({ kind: z.literal('afterAccept') }),
]);
type Next = z.infer<typeof nextSchema>;

async function collect(stream: AsyncIterable<unknown>): Promise<Buffer> {
  const pieces: Buffer[] = [];
  for await (const piece of stream) {
    pieces.push(Buffer.isBuffer(piece) ? piece : Buffer.from(String(piece)));
  }
  return Buffer.concat(pieces);
}

function smtpError(code: number, message: string): Error {
  return Object.assign(new Error(message), { responseCode: code });
}

function send(response: ServerResponse, status: number, type: string, body: string, csp: string) {
  response.writeHead(status, {
    'content-type': `${type}; charset=utf-8`,
    'cache-control': 'no-store',
    'content-security-policy': csp,
  });
  response.end(body);
}
const pagePolicy = "default-src 'none'; style-src 'self'; frame-src 'self'; form-action 'self'";
const mailPolicy = "default-src 'none'; style-src 'unsafe-inline'; sandbox";

/** Starts SMTP and the inbox page on loopback; port 0 takes free ones. */
export async function start(options: MailStandInOptions): Promise<MailStandIn> {
  const store = new MailStore(options.folder);
  await store.open();
  const nexts: Next[] = [];

  const smtp = new SMTPServer({
    disabledCommands: ['AUTH', 'STARTTLS'],
    disableReverseLookup: true,
    size: 5 * 1024 * 1024,
    onData: (stream, session, callback) => {
      const take = async () => {
        const raw = await collect(stream);
        const next = nexts.shift();
        if (next?.kind === 'fail') {
          throw smtpError(next.code, next.message);
        }
        if (next?.kind === 'late') {
          await wait(next.milliseconds);
        }
        const parsed = await simpleParser(raw);
        const fault = faultOf(parsed);
        if (fault !== null) {
          throw smtpError(554, fault);
        }
        await store.add(raw, parsed, new Date().toISOString());
        if (next?.kind === 'afterAccept') {
          throw smtpError(421, 'connection lost after the message was taken');
        }
      };
      take().then(
        () => {
          callback(null, `kept for ${session.envelope.rcptTo.length} recipients`);
        },
        (error: unknown) => {
          callback(error instanceof Error ? error : smtpError(451, 'the stand-in failed'));
        },
      );
    },
  });

  async function control(request: IncomingMessage, response: ServerResponse, path: string) {
    if (path === '/__calls' && request.method === 'GET') {
      send(response, 200, 'application/json', JSON.stringify(store.list(null)), pagePolicy);
      return;
    }
    if (path === '/__calls' && request.method === 'DELETE') {
      await store.clear();
      nexts.length = 0;
      response.writeHead(204).end();
      return;
    }
    const isNext = path === '/__next' && request.method === 'POST';
    const next = nextSchema.safeParse(
      isNext ? JSON.parse((await collect(request)).toString()) : undefined,
    );
    if (!next.success) {
      send(response, 400, 'application/json', '{"detail":"not understood"}', pagePolicy);
      return;
    }
    nexts.push(next.data);
    response.writeHead(204).end();
  }

  async function answer(request: IncomingMessage, response: ServerResponse): Promise<void> {
    const address = new URL(request.url ?? '/', 'http://127.0.0.1');
    const path = address.pathname;
    if (path.startsWith('/__')) {
      await control(request, response, path);
      return;
    }
    if (path === '/stand-in.css') {
      send(response, 200, 'text/css', styleSheet, pagePolicy);
      return;
    }
    if (path === '/') {
      const recipient = address.searchParams.get('to') ?? '';
      send(response, 200, 'text/html', inboxPage(store.list(recipient), recipient), pagePolicy);
      return;
    }
    const match = /^\/mails\/(\d+)(\/html)?$/.exec(path);
    const mail = match?.[1] === undefined ? undefined : store.find(Number(match[1]));
    if (mail === undefined) {
      send(response, 404, 'text/html', missingPage(), pagePolicy);
      return;
    }
    if (match?.[2] === undefined) {
      send(response, 200, 'text/html', mailPage(mail), pagePolicy);
      return;
    }
    send(response, 200, 'text/html', mail.html ?? '', mailPolicy);
  }

  const http = createServer((request, response) => {
    answer(request, response).catch((error: unknown) => {
      const detail = error instanceof SyntaxError ? 'the body is not JSON' : 'the stand-in failed';
      send(
        response,
        error instanceof SyntaxError ? 400 : 500,
        'application/json',
        JSON.stringify({ detail }),
        pagePolicy,
      );
    });
  });
  const smtpServer = smtp.listen(options.smtpPort, '127.0.0.1');
  const smtpPort = await listening(smtpServer, options.smtpPort);
  const httpPort = await listening(http.listen(options.httpPort, '127.0.0.1'), options.httpPort);
  return {
    smtpUrl: `smtp://127.0.0.1:${smtpPort}`,
    url: `http://127.0.0.1:${httpPort}`,
    close: async () => {
      await new Promise<void>((resolve) => {
        smtp.close(resolve);
      });
      await new Promise<void>((resolve) => {
        http.close(() => {
          resolve();
        });
        http.closeAllConnections();
      });
    },
  };
}

type Listener = {
  once(event: 'listening', done: () => void): unknown;
  once(event: 'error', fail: (error: Error) => void): unknown;
  address(): unknown;
};

function listening(server: Listener, wanted: number): Promise<number> {
  return new Promise((resolve, reject) => {
    server.once('error', reject);
    server.once('listening', () => {
      const address = server.address();
      const hasPort = typeof address === 'object' && address !== null && 'port' in address;
      resolve(hasPort && typeof address.port === 'number' ? address.port : wanted);
    });
  });
}
