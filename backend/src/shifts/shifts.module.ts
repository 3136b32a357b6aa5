import { Module } from '@nestjs/common';
import { FixesModule } from '../fixes/fixes.module.js';
import { ShiftsService } from './shifts.service.js';

@Module({ imports: [FixesModule], providers: [ShiftsService], exports: [ShiftsService] })
export class ShiftsModule {}
