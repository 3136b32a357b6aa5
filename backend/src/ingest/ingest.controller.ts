import { Body, Controller, HttpCode, Post, Query, Req } from '@nestjs/common';
import { ApiBearerAuth, ApiBody, ApiConsumes, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import {
  ingestAnswer,
  ingestEpochsBody,
  ingestQuery,
  type IngestAnswer,
  type IngestQuery,
} from '@hubtack/contracts/ingest/ingest.js';
import { AllowRoverKey } from '../auth/access.js';
import { ProblemException } from '../common/problem.exception.js';
import { IngestService } from './ingest.service.js';
import type { RoverRequest } from './rover-key.middleware.js';

@ApiTags('ingest')
@ApiBearerAuth()
@AllowRoverKey()
@Controller('ingest')
export class IngestController {
  constructor(private readonly ingest: IngestService) {}

  /** Sentences as a receiver writes them, one a line, live or stored. */
  @Post('nmea')
  @HttpCode(200)
  @ApiConsumes('text/plain')
  @ApiBody({ schema: { type: 'string', format: 'binary' } })
  @ApiOkResponse({ standardSchema: ingestAnswer })
  nmea(
    @Req() request: RoverRequest,
    @Query({ schema: ingestQuery }) query: IngestQuery,
  ): Promise<IngestAnswer> {
    const body: unknown = request.body;
    if (!Buffer.isBuffer(body))
      throw new ProblemException(
        415,
        'unsupportedMediaType',
        'Send the sentences as Content-Type: text/plain.',
      );
    return this.ingest.sentences(request.roverId!, body, query.date);
  }

  /** Epochs that were put together elsewhere. */
  @Post('epochs')
  @HttpCode(200)
  @ApiOkResponse({ standardSchema: ingestAnswer })
  epochs(
    @Req() request: RoverRequest,
    @Body({ schema: ingestEpochsBody }) body: { epochs: unknown[] },
  ): Promise<IngestAnswer> {
    return this.ingest.epochs(request.roverId!, body.epochs);
  }
}
