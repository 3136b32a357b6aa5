import { z } from 'zod';
import { readOptions } from '../cli/options.js';
import { startMailbox } from './mailbox.js';

const usage = `A local SMTP server that keeps what it gets, and a page to read it.

  npm run mailbox -- [--port 1025] [--page 1080] [--folder var/mailbox]`;

const options = readOptions(
  usage,
  { port: { type: 'string' }, page: { type: 'string' }, folder: { type: 'string' } },
  z.object({
    port: z.coerce.number().int().min(0).max(65_535).default(1025),
    page: z.coerce.number().int().min(0).max(65_535).default(1080),
    folder: z.string().default('var/mailbox'),
  }),
);
try {
  const mailbox = await startMailbox({
    smtpPort: options.port,
    pagePort: options.page,
    folder: options.folder,
  });
  console.log(`SMTP_URL=${mailbox.smtpUrl}\nRead the mails at ${mailbox.pageUrl}`);
  for (const signal of ['SIGINT', 'SIGTERM'] as const) process.once(signal, () => void mailbox.close());
} catch (error) {
  const { code, message } = error as NodeJS.ErrnoException;
  console.error(code === 'EADDRINUSE' ? `${message}: say another --port or --page` : message);
  process.exit(1);
}
