import { Global, Module } from '@nestjs/common';
import { TapsService } from './taps.service.js';

@Global()
@Module({ providers: [TapsService], exports: [TapsService] })
export class TapsModule {}
