import { once } from 'node:events';
import { mkdtempSync, readFileSync, readdirSync, rmSync } from 'node:fs';
import { connect } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, expect, it } from 'vitest';
import { startMailbox, type Mailbox } from './mailbox.js';

let folder: string;
let mailbox: Mailbox;
const open = async () => {
  mailbox = await startMailbox({ pagePort: 0, folder });
};
beforeEach(async () => {
  folder = mkdtempSync(join(tmpdir(), 'hubtack-mailbox-'));
  await open();
});
afterEach(async () => {
  await mailbox.close();
  rmSync(folder, { recursive: true });
});

/** One mail by plain SMTP (RFC 5321), a command at a time. */
async function send(subject: string, text: string): Promise<void> {
  const { hostname, port } = new URL(mailbox.smtpUrl);
  const socket = connect(Number(port), hostname);
  const say = async (line: string, expected: string) => {
    if (line) socket.write(`${line}\r\n`);
    const [answer] = (await once(socket, 'data')) as [Buffer];
    expect(answer.toString().slice(0, 3)).toBe(expected);
  };
  await say('', '220');
  await say('EHLO field.example', '250');
  await say('MAIL FROM:<hubtack@pennywort.example>', '250');
  await say('RCPT TO:<chief.alder@pennywort.example>', '250');
  await say('DATA', '354');
  const head = `From: hubtack@pennywort.example\r\nTo: chief.alder@pennywort.example\r\nSubject: ${subject}`;
  const type = 'Content-Type: text/plain; charset=utf-8\r\nContent-Transfer-Encoding: base64';
  await say(`${head}\r\n${type}\r\n\r\n${Buffer.from(text).toString('base64')}\r\n.`, '250');
  socket.end('QUIT\r\n');
}

it('keeps what it gets, in memory and as .eml, and hands it to whoever waits for it', async () => {
  const waited = mailbox.waitFor(({ subject }) => subject === 'Invitation');
  await send('Reminder', 'another');
  await send('Invitation', 'Grüße: http://127.0.0.1:3000/join?a=1&b=<2>');
  const mail = { to: 'chief.alder@pennywort.example', text: 'Grüße: http://127.0.0.1:3000/join?a=1&b=<2>' };
  expect(await waited).toMatchObject(mail);
  expect(await mailbox.waitFor(({ subject }) => subject === 'Invitation')).toMatchObject(mail);
  expect(readFileSync(join(folder, '0002.eml'), 'utf8')).toContain('Subject: Invitation');
});

it('its page shows mails without running what is in them, and a list for programs', async () => {
  await send('<script>alert(1)</script>', 'see http://127.0.0.1:3000/join?token=abc');
  const page = await (await fetch(mailbox.pageUrl!)).text();
  expect(page).not.toContain('<script>');
  expect(page).toContain('<a href="http://127.0.0.1:3000/join?token=abc">');
  const list = (await (await fetch(new URL('/mails.json', mailbox.pageUrl!))).json()) as unknown[];
  expect(list).toMatchObject([{ subject: '<script>alert(1)</script>' }]);
});

it('mails of earlier runs stay in the folder', async () => {
  await send('One', '1');
  await mailbox.close();
  await open();
  await send('Two', '2');
  expect(readdirSync(folder).sort()).toEqual(['0001.eml', '0002.eml']);
  expect(readFileSync(join(folder, '0001.eml'), 'utf8')).toContain('Subject: One');
});
