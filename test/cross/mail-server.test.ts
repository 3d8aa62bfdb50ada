import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import nodemailer from 'nodemailer';
import { startMailServer } from '@foldwright/server/fakes/mail-server/start-mail-server';

describe('the local mail server', () => {
  it('keeps what it takes, readable again after a restart', async () => {
    const stateDirectory = fs.mkdtempSync(path.join(os.tmpdir(), 'mail-server-'));
    const settings = { port: 0, httpPort: 0, stateDirectory, callbackUrl: null, apiKey: '', secret: '', paceMs: 10 };
    const first = await startMailServer(settings);
    const transport = nodemailer.createTransport({ host: '127.0.0.1', port: first.smtpPort, ignoreTLS: true });
    const text =
      'Straße 3, 90° bend.\n\nA second paragraph that is long enough to be broken over several lines by the encoding of the mail.';
    await transport.sendMail({
      from: 'a@example.test',
      to: 'b@example.test',
      subject: 'Bügel fürs Wägelchen, 90° gebogen',
      text,
      messageId: '<1@example.test>',
    });
    await first.close();

    const second = await startMailServer(settings);
    const [mail] = second.messages();
    expect(mail).toMatchObject({
      to: 'b@example.test',
      subject: 'Bügel fürs Wägelchen, 90° gebogen',
      messageId: '<1@example.test>',
    });
    expect(mail?.text.trim()).toBe(text);
    const page = await (await fetch(second.url)).text();
    expect(page).toContain('Bügel fürs Wägelchen');
    expect((await fetch(`${second.url}/messages/99`)).status).toBe(404);
    await second.close();
    fs.rmSync(stateDirectory, { recursive: true });
  });
});
