import fs from 'node:fs';
import path from 'node:path';

/** A message as it arrived. */
export interface KeptMail {
  readonly number: number;
  readonly from: string;
  readonly to: string;
  readonly subject: string;
  readonly messageId: string;
  readonly text: string;
}

/** Messages as files in a folder, `000001.eml` on, so that they can be read with anything. */
export class MailBox {
  constructor(private readonly directory: string) {
    fs.mkdirSync(directory, { recursive: true });
  }

  keep(raw: Buffer): number {
    const number = (this.numbers().at(-1) ?? 0) + 1;
    const target = this.fileOf(number);
    fs.writeFileSync(`${target}.new`, raw);
    fs.renameSync(`${target}.new`, target);
    return number;
  }

  /** All messages, oldest first. */
  all(): KeptMail[] {
    return this.numbers().map((number) => readMail(number, this.raw(number) ?? ''));
  }

  raw(number: number): string | undefined {
    const file = this.fileOf(number);
    return fs.existsSync(file) ? fs.readFileSync(file, 'utf8') : undefined;
  }

  private fileOf(number: number): string {
    return path.join(this.directory, `${String(number).padStart(6, '0')}.eml`);
  }

  private numbers(): number[] {
    const names = fs.readdirSync(this.directory).filter((name) => /^\d+\.eml$/.test(name));
    return names.map((name) => Number.parseInt(name, 10)).sort((a, b) => a - b);
  }
}

/** The parts of a message that a list shows. Source: RFC 5322 (headers), RFC 2047 (encoded words), RFC 2045 (bodies). */
export function readMail(number: number, raw: string): KeptMail {
  const [head = '', ...rest] = raw.split(/\r?\n\r?\n/);
  const unfolded = head.replace(/\r?\n[ \t]+/g, ' ');
  const header = (name: string) => {
    const line = unfolded.split(/\r?\n/).find((each) => each.toLowerCase().startsWith(`${name}:`));
    return decodeWords((line ?? '').slice(name.length + 1).trim());
  };
  const encoding = header('content-transfer-encoding').toLowerCase();
  return {
    number,
    from: header('from'),
    to: header('to'),
    subject: header('subject'),
    messageId: header('message-id'),
    text: decodeBody(rest.join('\n\n'), encoding),
  };
}

function decodeBody(body: string, encoding: string): string {
  if (encoding === 'base64') return Buffer.from(body, 'base64').toString('utf8');
  if (encoding === 'quoted-printable') return decodeQuoted(body.replace(/=\r?\n/g, ''));
  return body;
}

function decodeWords(text: string): string {
  const joined = text.replace(/\?=\s+=\?/g, '?==?');
  return joined.replace(/=\?utf-8\?([bq])\?([^?]*)\?=/gi, (_whole, kind: string, value: string) =>
    kind.toLowerCase() === 'b'
      ? Buffer.from(value, 'base64').toString('utf8')
      : decodeQuoted(value.replaceAll('_', ' ')),
  );
}

function decodeQuoted(text: string): string {
  const bytes = text.replace(/=([0-9A-Fa-f]{2})/g, (_whole, hex: string) =>
    String.fromCharCode(Number.parseInt(hex, 16)),
  );
  // Letters above 255 were never encoded, so the text is not a run of bytes and stays as it is.
  return /[^\0-\xff]/.test(bytes) ? bytes : Buffer.from(bytes, 'latin1').toString('utf8');
}
