import { Module, RequestMethod, type MiddlewareConsumer, type NestModule } from '@nestjs/common';
import { AuthModule } from '../auth/auth.module.js';
import { tokenLimits } from '../auth/rate-limits.js';
import { DisplaysController } from './displays.controller.js';
import { DisplaysService } from './displays.service.js';

@Module({ imports: [AuthModule], controllers: [DisplaysController], providers: [DisplaysService] })
export class DisplaysModule implements NestModule {
  configure(consumer: MiddlewareConsumer): void {
    consumer.apply(...tokenLimits()).forRoutes({ path: 'displays/open', method: RequestMethod.POST });
  }
}
