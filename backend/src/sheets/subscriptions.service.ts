import { Injectable } from '@nestjs/common';
import type { Role } from '@hubtack/contracts/auth/role.js';
import {
  sheetsOfRole,
  type SubscriptionList,
  type SubscriptionsBody,
} from '@hubtack/contracts/sheets/subscription.js';
import type { Viewer } from '../auth/access.js';
import { forbidden, ProblemException } from '../common/problem.exception.js';
import { MailService } from '../mail/mail.service.js';
import { SettingsService } from '../settings/settings.service.js';
import { SubscriptionRepository } from './subscription.repository.js';

/** Which sheets a person has sent. */
@Injectable()
export class SubscriptionsService {
  constructor(
    private readonly subscriptions: SubscriptionRepository,
    private readonly settings: SettingsService,
    private readonly mail: MailService,
  ) {}

  mine(viewer: Viewer): SubscriptionList {
    const { userId, role } = personOf(viewer);
    const on = this.subscriptions.sheetsOf(userId);
    const { weeklyMailHour, timeZone } = this.settings.get();
    return {
      sheets: sheetsOfRole[role].map((sheet) => ({ sheet, isOn: on.includes(sheet) })),
      weeklyMailHour,
      timeZone,
      isMailSet: this.mail.isSet,
    };
  }

  set(viewer: Viewer, { sheets }: SubscriptionsBody): SubscriptionList {
    const { userId, role } = personOf(viewer);
    const errors = sheets.flatMap((sheet, index) =>
      sheetsOfRole[role].includes(sheet)
        ? []
        : [{ pointer: `/sheets/${index}`, detail: `The ${sheet} sheet is not for your role` }],
    );
    if (errors.length > 0)
      throw new ProblemException(400, 'invalidBody', `${errors[0]!.detail}.`, { errors });
    this.subscriptions.replace(userId, new Set(sheets));
    return this.mine(viewer);
  }
}

/** Sheets are for people; a display has none. */
function personOf({ userId, role }: Viewer): { userId: number; role: Role } {
  if (userId === null || role === 'display') throw forbidden();
  return { userId, role };
}
