import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { z } from 'zod';
import { startCaster } from '../caster/caster.js';
import { demoMountPoints } from '../caster/demo-mount-points.js';
import { startMailbox } from '../mailbox/mailbox.js';
import { Processes, freePort, waitUntilReady } from './processes.js';

const root = fileURLToPath(new URL('../../../', import.meta.url));
const folder = join(root, 'var/demo');
const wanted = z.coerce.number().int().min(1).max(65_535).default(3000).safeParse(process.env.PORT);
if (!wanted.success) {
  console.error('PORT is no port number');
  process.exit(2);
}
const port = await freePort(wanted.data);
const tcpPort = await freePort(10_110);
const usualCasterPort = 2101;
const casterPort = await freePort(usualCasterPort);
const url = `http://127.0.0.1:${port}`;

const processes = new Processes();
const mailbox = await startMailbox({ pagePort: await freePort(1080), folder: join(folder, 'mailbox') });
const caster = await startCaster({ mountPoints: demoMountPoints(), port: casterPort });
const stop = async (status: number) => {
  await processes.stop();
  await mailbox.close();
  await caster.close();
  process.exit(status);
};
for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP'] as const) process.once(signal, () => void stop(0));

async function start(): Promise<void> {
  processes.start(
    'The server',
    process.execPath,
    ['--enable-source-maps', join(root, 'backend/dist/main.js')],
    {
      DEMO: 'on',
      NODE_ENV: 'production',
      PORT: String(port),
      NMEA_TCP_PORT: String(tcpPort),
      DATABASE_FILE: join(folder, 'hubtack.sqlite'),
      UPLOADS_DIR: join(folder, 'uploads'),
      SMTP_URL: mailbox.smtpUrl,
      MAIL_FROM: 'Pennywort Surveys <hubtack@pennywort.example>',
      CASTER_PRIVATE_ADDRESSES: 'allow',
      DEMO_CASTER_PORT: String(casterPort),
      LOG_LEVEL: process.env.LOG_LEVEL ?? 'warn',
    },
  );
  await waitUntilReady(url, 60);
  const fleet = fileURLToPath(new URL('../fleet/main.js', import.meta.url));
  const keys = join(folder, 'demo-rover-keys.json');
  processes.start('The fleet', process.execPath, [fleet, '--scenario', 'demo', '--url', url, '--keys', keys]);
}

try {
  await start();
} catch (error) {
  console.error((error as Error).message);
  await stop(1);
}

const accounts = ['manager', 'dispatcher', 'technician', 'chief.alder', 'chief.banksia', 'chief.dogwood'];
// The sources keep the port that they were made with, so a demo begun at another one does not find this caster.
const casterNote =
  casterPort === usualCasterPort
    ? ''
    : ` (port ${usualCasterPort} was taken; a demo begun earlier looks there)`;
console.log(`
Hubtack runs with the demo firm Pennywort Surveys${port === wanted.data ? '' : ` (port ${wanted.data} was taken)`}:

  ${url}

Sign in as one of
${accounts.map((name) => `  ${name}@pennywort.example`).join('\n')}
with the password  tack-in-the-hub

Mails: ${mailbox.pageUrl}    Sentences over TCP: port ${tcpPort}    Caster: localhost:${casterPort}${casterNote}
Within a minute Banksia's corrections stop, Dogwood goes under trees, Echidna falls silent; Fernwren never had a fix.
Ctrl-C stops everything. The demo's data is in var/demo; delete that folder to begin anew.
`);
