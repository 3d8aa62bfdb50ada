import type { AddressInfo } from 'node:net';
import express from 'express';
import { SMTPServer } from 'smtp-server';
import type { FakeSettings } from '../fake-settings';
import { escapeHtml, htmlPage, sendHtml } from '../html';
import { listenOnLoopback } from '../listening-server';
import type { KeptMail } from './mail-box';
import { MailBox } from './mail-box';

/** The local mail server and the page that lists what it took. */
export interface LocalMailServer {
  readonly smtpPort: number;
  readonly url: string;
  messages(): KeptMail[];
  close(): Promise<void>;
}

const STYLE = `
:root { color-scheme: light dark; font: 16px/1.5 system-ui, sans-serif; }
main { max-width: 60rem; margin: 2rem auto; padding: 0 1rem; }
table { border-collapse: collapse; width: 100%; }
th, td { text-align: left; padding: .4rem .6rem .4rem 0; border-bottom: 1px solid; vertical-align: top; }
`;

/** Start the local mail server: takes mail for anybody, keeps it, sends nothing on. */
export async function startMailServer(settings: FakeSettings): Promise<LocalMailServer> {
  const box = new MailBox(settings.stateDirectory);
  const smtp = new SMTPServer({
    // The sender is on this machine and has no certificate to trust.
    disabledCommands: ['STARTTLS', 'AUTH'],
    authOptional: true,
    size: 10_000_000,
    onData(stream, _session, done) {
      const chunks: Buffer[] = [];
      stream.on('data', (chunk: Buffer) => chunks.push(chunk));
      stream.on('end', () => {
        if (stream.sizeExceeded) done(new Error('The message is too large.'));
        else {
          box.keep(Buffer.concat(chunks));
          done();
        }
      });
    },
  });
  // A client that vanishes in the middle of a conversation is no reason to fall over.
  smtp.on('error', () => undefined);
  const smtpPort = await new Promise<number>((resolve, reject) => {
    smtp.server.once('error', reject);
    smtp.listen(settings.port, '127.0.0.1', () => {
      const address: AddressInfo | string | null = smtp.server.address();
      if (address === null || typeof address === 'string') reject(new Error('the mail server has no port'));
      else resolve(address.port);
    });
  });

  const app = express();
  app.disable('x-powered-by');
  app.get('/style.css', (_request, response) => void response.type('css').send(STYLE));
  app.get('/messages.json', (_request, response) => void response.json({ messages: box.all() }));
  app.get('/messages/:number', (request, response) => {
    const raw = box.raw(Number(request.params.number));
    if (raw === undefined) response.status(404).type('text').send('No such message.\n');
    else response.set('x-content-type-options', 'nosniff').type('text').send(raw);
  });
  app.get('/', (_request, response) => sendHtml(response, listPage(box.all())));
  const web = await listenOnLoopback(app, settings.httpPort);

  return {
    smtpPort,
    url: web.url,
    messages: () => box.all(),
    close: async () => {
      await web.close();
      await new Promise<void>((done) => smtp.close(() => done()));
    },
  };
}

function listPage(mails: readonly KeptMail[]): string {
  const rows = [...mails]
    .reverse()
    .map(
      (mail) =>
        `<tr><td>${escapeHtml(mail.to)}</td><td><a href="/messages/${mail.number}">${escapeHtml(mail.subject)}</a></td>` +
        `<td>${escapeHtml(mail.text.slice(0, 160))}</td></tr>`,
    );
  const table =
    rows.length === 0
      ? '<p>No mail yet.</p>'
      : `<table><thead><tr><th scope="col">To</th><th scope="col">Subject</th><th scope="col">Begins</th></tr></thead><tbody>${rows.join('')}</tbody></table>`;
  return htmlPage(
    'Local mail',
    `<main><h1>Local mail</h1><p>Mail that was sent from this machine. It went nowhere else.</p>${table}</main>`,
  );
}
