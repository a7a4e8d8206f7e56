import { randomUUID } from 'node:crypto';
import { mkdirSync, readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import { join } from 'node:path';
import { simpleParser } from 'mailparser';
import { SMTPServer } from 'smtp-server';

export interface CaughtMail {
  readonly id: string;
  readonly at: string;
  readonly from: string;
  readonly to: string[];
  readonly subject: string;
  readonly text: string;
  readonly html: string;
}

export interface MailFake {
  readonly smtpUrl: string;
  readonly httpUrl: string;
  stop(): Promise<void>;
}

/**
 * An SMTP server that delivers nothing: mails are kept as files and listed, newest first, at `GET /mails`, one at
 * `GET /mails/:id`; `GET /wait?to=…&ms=…` answers with the newest mail to that address as soon as there is one.
 */
export async function startMailFake(folder: string): Promise<MailFake> {
  mkdirSync(folder, { recursive: true });
  const smtp = new SMTPServer({
    authOptional: true,
    disabledCommands: ['STARTTLS', 'AUTH'],
    onData: (stream, session, done) => {
      simpleParser(stream).then(
        (parsed) => {
          const mail: CaughtMail = {
            id: `${Date.now()}-${randomUUID().slice(0, 8)}`,
            at: new Date().toISOString(),
            from: parsed.from?.text ?? '',
            to: session.envelope.rcptTo.map((one) => one.address),
            subject: parsed.subject ?? '',
            text: parsed.text ?? '',
            html: parsed.html || '',
          };
          writeFileSync(join(folder, `${mail.id}.json`), JSON.stringify(mail));
          done();
        },
        (error: Error) => done(error),
      );
    },
  });
  await new Promise<void>((resolve) => smtp.listen(0, '127.0.0.1', resolve));
  const list = (): CaughtMail[] =>
    readdirSync(folder)
      .filter((name) => name.endsWith('.json'))
      .sort()
      .reverse()
      .slice(0, 200)
      .map((name) => JSON.parse(readFileSync(join(folder, name), 'utf8')) as CaughtMail);
  const waitFor = async (to: string, until: number): Promise<CaughtMail | undefined> => {
    for (;;) {
      const found = list().find((mail) => mail.to.includes(to));
      if (found || Date.now() >= until) return found;
      await new Promise((resolve) => setTimeout(resolve, 50));
    }
  };
  const answerTo = async (url: URL): Promise<CaughtMail | CaughtMail[] | undefined> => {
    const id = /^\/mails\/([\w-]+)$/.exec(url.pathname)?.[1];
    if (id) return list().find((mail) => mail.id === id);
    if (url.pathname === '/mails') return list();
    if (url.pathname !== '/wait') return undefined;
    const ms = Math.min(Number(url.searchParams.get('ms') ?? 5000), 60_000);
    return waitFor(url.searchParams.get('to') ?? '', Date.now() + ms);
  };
  const http = createServer((request, response) => {
    answerTo(new URL(request.url ?? '/', 'http://mail.local')).then(
      (answer) => {
        response.writeHead(answer ? 200 : 404, { 'content-type': 'application/json' });
        response.end(JSON.stringify(answer ?? null));
      },
      () => response.writeHead(500).end(),
    );
  });
  await new Promise<void>((resolve) => http.listen(0, '127.0.0.1', () => resolve()));
  return {
    smtpUrl: `smtp://127.0.0.1:${(smtp.server.address() as AddressInfo).port}`,
    httpUrl: `http://127.0.0.1:${(http.address() as AddressInfo).port}`,
    stop: async () => {
      await new Promise<void>((resolve) => smtp.close(() => resolve()));
      http.closeAllConnections();
      await new Promise<void>((resolve) => http.close(() => resolve()));
    },
  };
}
