import { Module } from '@nestjs/common';
import { ShiftsService } from './shifts.service.js';

@Module({ providers: [ShiftsService], exports: [ShiftsService] })
export class ShiftsModule {}
