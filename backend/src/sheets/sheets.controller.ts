import { Body, Controller, Get, Put, Query, StreamableFile } from '@nestjs/common';
import { ApiOkResponse, ApiProduces, ApiTags } from '@nestjs/swagger';
import {
  subscriptionList,
  subscriptionsBody,
  type SubscriptionList,
  type SubscriptionsBody,
} from '@hubtack/contracts/sheets/subscription.js';
import { weeklyCsvQuery, type WeeklyCsvQuery } from '@hubtack/contracts/sheets/weekly-csv.js';
import { AllowRoles, CurrentViewer, type Viewer } from '../auth/access.js';
import { WeeklyService } from '../weekly/weekly.service.js';
import { SubscriptionsService } from './subscriptions.service.js';
import { weeklyCsv } from './weekly-csv.js';

@ApiTags('weekly')
@Controller('weekly.csv')
export class WeeklyCsvController {
  constructor(private readonly weeks: WeeklyService) {}

  /** A row for each rover-shift, and their sum. This week when none is asked for. Money is the manager's business. */
  @Get()
  @AllowRoles('dispatcher', 'technician')
  @ApiProduces('text/csv')
  @ApiOkResponse({ schema: { type: 'string' } })
  csv(
    @CurrentViewer() viewer: Viewer,
    @Query({ schema: weeklyCsvQuery }) query: WeeklyCsvQuery,
  ): StreamableFile {
    const withMoney = viewer.role === 'manager';
    const weekly = this.weeks.week(query.week ?? this.weeks.thisWeek(), withMoney);
    return new StreamableFile(Buffer.from(weeklyCsv(weekly, withMoney), 'utf8'), {
      type: 'text/csv; charset=utf-8; header=present',
      disposition: `attachment; filename="fix-time-${weekly.week}.csv"`,
    });
  }
}

@ApiTags('notices')
@Controller('subscriptions')
@AllowRoles('dispatcher', 'technician', 'crewChief')
export class SubscriptionsController {
  constructor(private readonly subscriptions: SubscriptionsService) {}

  /** Which sheets I have sent by mail, of those that my role may have. */
  @Get()
  @ApiOkResponse({ standardSchema: subscriptionList })
  get(@CurrentViewer() viewer: Viewer): SubscriptionList {
    return this.subscriptions.mine(viewer);
  }

  @Put()
  @ApiOkResponse({ standardSchema: subscriptionList })
  set(
    @CurrentViewer() viewer: Viewer,
    @Body({ schema: subscriptionsBody }) body: SubscriptionsBody,
  ): SubscriptionList {
    return this.subscriptions.set(viewer, body);
  }
}
