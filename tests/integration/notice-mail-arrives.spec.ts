import { Changes } from '@hubtack/backend/common/changes.js';
import { lostFixes } from '@hubtack/drizzle/schema/lost-fixes.js';
import { startMailbox } from '@hubtack/simulators/mailbox/mailbox.js';
import { expect, it } from 'vitest';
import { startServer } from '../harness/server.js';
import { until } from '../harness/until.js';

it('a mount point that is down is in the dispatcher’s mail at once, and in the metrics while it waits', async () => {
  const mailbox = await startMailbox({});
  const server = await startServer({
    SMTP_URL: mailbox.smtpUrl,
    PUBLIC_URL: 'https://board.pennywort.example',
  });
  try {
    await server.as('dispatcher');
    const now = server.clock.now();
    const values = {
      kind: 'mountPoint',
      mountPoint: 'TANF00',
      startAt: now - 30_000,
      raisedAt: now,
    } as const;
    server.database.insert(lostFixes).values(values).run();
    server.app.get(Changes).announce({ kind: 'lostFix', lostFixIds: [1] });
    const mail = await mailbox.waitFor(({ to }) => to === 'dispatcher@pennywort.example');
    expect(mail.subject).toBe('Corrections stopped at mount point TANF00');
    expect(mail.text).toContain('https://board.pennywort.example');
    await until(async () => {
      const metrics = await (await fetch(new URL('/metrics', server.url))).text();
      expect(metrics).toContain('hubtack_outbox_waiting_mails 0');
    });
    expect(mailbox.mails).toHaveLength(1);
  } finally {
    await server.close();
    await mailbox.close();
  }
});
