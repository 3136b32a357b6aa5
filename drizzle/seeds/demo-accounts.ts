/** The demo's sign-ins are public: they are shown on its sign-in page, and only a demo database has them. */
export const DEMO_MAIL_DOMAIN = 'pennywort.example';
export const DEMO_PASSWORD = 'tack-in-the-hub';
