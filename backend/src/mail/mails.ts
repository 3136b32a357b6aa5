/** A mail in words: text only, short, no link but the one it is about. */
export interface Mail {
  to: string;
  subject: string;
  text: string;
}

interface Addressee {
  name: string;
  email: string;
}

export const inviteMail = (user: Addressee, firmName: string, link: string): Mail => ({
  to: user.email,
  subject: `Your sign-in to the fix board of ${firmName}`,
  text: [
    `Hello ${user.name},`,
    '',
    `${firmName} keeps its RTK fix board in Hubtack. Choose your password here:`,
    '',
    link,
    '',
    'The link works once, for seven days. If it has gone stale, ask your manager to send another.',
  ].join('\n'),
});

export const resetMail = (user: Addressee, link: string): Mail => ({
  to: user.email,
  subject: 'Set a new Hubtack password',
  text: [
    `Hello ${user.name},`,
    '',
    'Somebody, we hope you, asked for a new password. Choose it here:',
    '',
    link,
    '',
    'The link works once, for one hour, and signs you out everywhere else. If it was not you, nothing has changed.',
  ].join('\n'),
});
