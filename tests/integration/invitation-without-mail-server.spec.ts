import { expect, it } from 'vitest';
import { startServer } from '../harness/server.js';

it('without a mail server the manager gets the invitation link to hand over', async () => {
  const server = await startServer();
  const body = { name: 'Someone', email: 'someone@pennywort.example', role: 'technician', crewId: null };
  const { link } = await (await server.as('manager')).json<{ link: string }>('POST', '/api/users', body);
  expect(link).toContain('/link/');
  await server.close();
});
