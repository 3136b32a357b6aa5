/** Imports run one way. Rules are by folder, so that a new folder is covered the day it appears. */
const only = (name, from, to) => ({
  name,
  severity: 'error',
  from: { path: from },
  to: { path: '^(contracts|drizzle|backend|dashboard|simulators|tests)/', pathNot: to },
});

module.exports = {
  forbidden: [
    {
      name: 'no-cycles',
      severity: 'error',
      from: {},
      to: { circular: true, viaOnly: { dependencyTypesNot: ['type-only'] } },
    },
    only('contracts-stand-alone', '^contracts/', '^contracts/'),
    only('drizzle-on-contracts', '^drizzle/', '^(contracts|drizzle)/'),
    only('backend-on-drizzle', '^backend/', '^(contracts|drizzle|backend)/'),
    only('dashboard-on-contracts', '^dashboard/', '^(contracts|dashboard)/'),
    only('simulators-on-contracts', '^simulators/', '^(contracts|simulators)/'),
    {
      name: 'pure-domain',
      comment: 'The domain is functions over plain values: no framework, no tables.',
      severity: 'error',
      from: {
        path: '^backend/src/(fixes/(timeline|dating|epoch\\.assembler|late-epochs|epoch)|shifts/(on-shift|crew-shifts|shift-steps)|lost-fixes/(detector|reconcile|chattering|corrections-watch|shared-cause|diagnosis|figures|evidence-window|flag-end|lost-fix\\.view)|notices/(notice-policy|notice-tellings|notice-day|notice-words)|mail/smtp-outcome|weekly/(part-figures|tolerance|week-figures|week-sentence)|sheets/(csv|weekly-csv|sheet-words|sheet|sheet-text|sheet-html|state-bar|weekly-mail|daily-sheet|sheet-times)|board/(live-lane|frame)|common/(interval|local-day|base-distance|statistics)|ingest/(time-limits|epoch\\.json|sentence\\.batch)|logs/(analyse-log|first-day|epoch-columns|log-figures|log-losses|part-sink|rejected-lines|refusals|log-notes|log-kind))\\.ts$',
      },
      to: { path: '(@nestjs|drizzle-orm|better-sqlite3|^drizzle/)', dependencyTypesNot: ['type-only'] },
    },
    {
      name: 'dashboard-shared-below-features',
      severity: 'error',
      from: { path: '^dashboard/src/(components|theme|lib|live)/' },
      to: { path: '^dashboard/src/(features|app)/' },
    },
    {
      name: 'dashboard-lib-at-the-bottom',
      severity: 'error',
      from: { path: '^dashboard/src/(theme|lib)/' },
      to: { path: '^dashboard/src/(live|components)/' },
    },
    {
      name: 'dashboard-features-apart',
      severity: 'error',
      from: { path: '^dashboard/src/features/([^/]+)/' },
      to: { path: '^dashboard/src/features/', pathNot: '^dashboard/src/features/$1/' },
    },
    {
      name: 'dashboard-app-on-top',
      severity: 'error',
      from: { path: '^dashboard/src/features/' },
      to: { path: '^dashboard/src/app/' },
    },
    { name: 'resolvable', severity: 'error', from: {}, to: { couldNotResolve: true, pathNot: '^virtual:' } },
  ],
  options: {
    doNotFollow: { path: 'node_modules' },
    exclude: { path: '(^|/)dist/' },
    tsPreCompilationDeps: true,
    enhancedResolveOptions: {
      exportsFields: ['exports'],
      conditionNames: ['hubtack-source', 'import', 'types', 'default'],
      extensions: ['.ts', '.tsx', '.js', '.mjs', '.css', '.json'],
    },
  },
};
