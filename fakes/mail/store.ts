import { mkdir, readdir, readFile, rm, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { simpleParser, type AddressObject, type ParsedMail } from 'mailparser';

export type StoredMail = {
  readonly id: number;
  readonly receivedAt: string;
  readonly messageId: string;
  readonly from: string;
  readonly to: readonly string[];
  readonly subject: string;
  readonly text: string;
  readonly html: string | null;
  readonly headers: readonly { readonly name: string; readonly value: string }[];
};

const kept = 500;

function addresses(field: AddressObject | AddressObject[] | undefined): string[] {
  const objects = field === undefined ? [] : Array.isArray(field) ? field : [field];
  return objects.flatMap((object) => object.value.map((entry) => entry.address ?? ''));
}

function readMail(id: number, receivedAt: string, parsed: ParsedMail): StoredMail {
  return {
    id,
    receivedAt,
    messageId: parsed.messageId ?? '',
    from: addresses(parsed.from)[0] ?? '',
    to: addresses(parsed.to),
    subject: parsed.subject ?? '',
    text: parsed.text ?? '',
    html: typeof parsed.html === 'string' ? parsed.html : null,
    headers: parsed.headerLines.map((entry) => ({
      name: entry.key,
      value: entry.line.slice(entry.line.indexOf(':') + 1).trim(),
    })),
  };
}

/** Why a message is not taken; the SMTP answer carries the sentence. */
export function faultOf(parsed: ParsedMail): string | null {
  if (parsed.messageId === undefined) {
    return 'the message has no Message-ID';
  }
  if (addresses(parsed.from).length !== 1) {
    return 'the message has no single sender';
  }
  if (addresses(parsed.to).length === 0) {
    return 'the message has no recipient in its header';
  }
  if ((parsed.subject ?? '').trim() === '') {
    return 'the message has no subject';
  }
  return null;
}

/** Keeps the newest mails, in a folder too if one is given, so that a restart shows them again. */
export class MailStore {
  readonly #folder: string | null;
  #mails: StoredMail[] = [];
  #nextId = 1;

  constructor(folder: string | null) {
    this.#folder = folder;
  }

  async open(): Promise<void> {
    if (this.#folder === null) {
      return;
    }
    await mkdir(this.#folder, { recursive: true });
    const names = (await readdir(this.#folder)).filter((name) => /^\d+\.eml$/.test(name));
    const ids = names.map((name) => Number.parseInt(name, 10)).sort((a, b) => a - b);
    for (const id of ids.slice(-kept)) {
      const raw = await readFile(join(this.#folder, `${id}.eml`));
      const received = raw
        .subarray(0, raw.indexOf('\n'))
        .toString()
        .replace('X-Stand-In-Received: ', '');
      this.#mails.push(readMail(id, received.trim(), await simpleParser(raw)));
    }
    this.#nextId = (ids.at(-1) ?? 0) + 1;
  }

  async add(raw: Buffer, parsed: ParsedMail, receivedAt: string): Promise<StoredMail> {
    const id = this.#nextId;
    this.#nextId += 1;
    const mail = readMail(id, receivedAt, parsed);
    if (this.#folder !== null) {
      const stamped = Buffer.concat([Buffer.from(`X-Stand-In-Received: ${receivedAt}\r\n`), raw]);
      await writeFile(join(this.#folder, `${id}.eml`), stamped);
    }
    this.#mails.push(mail);
    while (this.#mails.length > kept) {
      const oldest = this.#mails.shift();
      if (oldest !== undefined && this.#folder !== null) {
        await rm(join(this.#folder, `${oldest.id}.eml`), { force: true });
      }
    }
    return mail;
  }

  list(recipient: string | null): StoredMail[] {
    const wanted = recipient?.trim().toLowerCase() ?? '';
    return this.#mails
      .filter((mail) => mail.to.some((address) => address.toLowerCase().includes(wanted)))
      .reverse();
  }

  find(id: number): StoredMail | undefined {
    return this.#mails.find((mail) => mail.id === id);
  }

  async clear(): Promise<void> {
    if (this.#folder !== null) {
      for (const mail of this.#mails) {
        await rm(join(this.#folder, `${mail.id}.eml`), { force: true });
      }
    }
    this.#mails = [];
  }
}
