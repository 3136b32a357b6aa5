/** The demo's sign-ins are public: they are shown on its sign-in page, and only a demo database has them. */
export const DEMO_MAIL_DOMAIN = 'pennywort.example';
export const DEMO_PASSWORD = 'tack-in-the-hub';
/** The demo's login at its own local caster: public as well. */
export const DEMO_CASTER_USER = 'pennywort';
export const DEMO_CASTER_PASSWORD = 'field-book-2026';
