import { Inject, Injectable } from '@nestjs/common';
import { mondayToFriday } from '@hubtack/contracts/crews/crew.js';
import { defaultLimits } from '@hubtack/contracts/lost-fixes/limits.js';
import { defaultCheckShotLimits } from '@hubtack/contracts/set-up/check-shot-limits.js';
import type { Settings, SettingsBody } from '@hubtack/contracts/settings/settings.js';
import { topographic } from '@hubtack/contracts/weekly/tolerance-profile.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { firmSettings } from '@hubtack/drizzle/schema/firm-settings.js';
import { AuditService } from '../audit/audit.service.js';
import type { Viewer } from '../auth/access.js';
import { Changes } from '../common/changes.js';
import { ProblemException } from '../common/problem.exception.js';
import { DATABASE } from '../database/database.module.js';

const ONLY_ROW = 1;
/** Until a manager has said otherwise. */
const defaults: Settings = {
  firmName: 'Our firm',
  timeZone: 'UTC',
  units: 'metric',
  currency: 'AUD',
  keepPositionsOffShift: false,
  limits: defaultLimits,
  toleranceProfile: topographic,
  otherProfiles: [],
  checkShotLimits: defaultCheckShotLimits,
  workingWeek: mondayToFriday,
  weeklyMailHour: 7,
};

@Injectable()
export class SettingsService {
  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    private readonly audit: AuditService,
    private readonly changes: Changes,
  ) {}

  get(): Settings {
    const row = this.database.select().from(firmSettings).get();
    if (!row) return defaults;
    const { id: _id, ...settings } = row;
    return settings;
  }

  change(viewer: Viewer, body: SettingsBody): Settings {
    const before = this.get();
    const settings: Settings = {
      ...body,
      limits: body.limits ?? before.limits,
      toleranceProfile: body.toleranceProfile ?? before.toleranceProfile,
      otherProfiles: body.otherProfiles ?? before.otherProfiles,
      checkShotLimits: body.checkShotLimits ?? before.checkShotLimits,
      workingWeek: body.workingWeek ?? before.workingWeek,
      weeklyMailHour: body.weeklyMailHour ?? before.weeklyMailHour,
    };
    refuseSameName(settings);
    this.database.transaction((tx) => {
      tx.insert(firmSettings)
        .values({ id: ONLY_ROW, ...settings })
        .onConflictDoUpdate({ target: firmSettings.id, set: settings })
        .run();
      this.audit.record(viewer, { action: 'settings.changed', subject: 'Settings', before, after: settings });
    });
    this.changes.announce({ kind: 'firm' });
    return settings;
  }
}

function refuseSameName({ toleranceProfile, otherProfiles }: Settings): void {
  const index = otherProfiles.findIndex(({ name }) => name === toleranceProfile.name);
  if (index < 0) return;
  const detail = 'The firm\u2019s profile has this name.';
  throw new ProblemException(400, 'invalidBody', detail, {
    errors: [{ pointer: `/otherProfiles/${index}/name`, detail }],
  });
}
