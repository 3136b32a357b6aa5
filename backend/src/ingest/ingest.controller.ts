import { Controller, HttpCode, Post, Req } from '@nestjs/common';
import { ApiBearerAuth, ApiBody, ApiConsumes, ApiOkResponse, ApiQuery, ApiTags } from '@nestjs/swagger';
import {
  ingestAnswer,
  ingestEpoch,
  ingestEpochsBody,
  ingestQuery,
  type IngestAnswer,
} from '@hubtack/contracts/ingest/ingest.js';
import type { Request } from 'express';
import { z } from 'zod';
import { AllowRoverKey } from '../auth/access.js';
import { ProblemException } from '../common/problem.exception.js';
import { IngestService } from './ingest.service.js';
import { readBody } from './request-body.js';
import { RoverKeyService } from './rover-key.service.js';

/** For the API's description only: epochs are judged one by one. */
const epochsSchema = z.toJSONSchema(z.object({ epochs: z.array(ingestEpoch) }), {
  target: 'openapi-3.0',
}) as unknown as { type: 'object' };

function checked<T extends z.ZodType>(schema: T, value: unknown): z.infer<T> {
  const result = schema.safeParse(value);
  if (result.success) return result.data;
  const errors = result.error.issues.map(({ path, message }) => ({
    pointer: `/${path.join('/')}`,
    detail: message,
  }));
  throw new ProblemException(400, 'invalidBody', errors[0]!.detail, { errors });
}

/**
 * Rovers post here. Key first, then the body, and no pipes: at one sentence a post each of Nest's stages counts
 * (bench `ingest/http-1`), so the two handlers read the request themselves.
 */
@ApiTags('ingest')
@ApiBearerAuth()
@AllowRoverKey()
@Controller('ingest')
export class IngestController {
  constructor(
    private readonly ingest: IngestService,
    private readonly keys: RoverKeyService,
  ) {}

  /** Sentences as a receiver writes them, one a line, live or stored. `date`: UTC date of the first one when stored. */
  @Post('nmea')
  @HttpCode(200)
  @ApiQuery({ name: 'date', required: false, schema: { type: 'string', format: 'date' } })
  @ApiConsumes('text/plain')
  @ApiBody({ schema: { type: 'string', format: 'binary' } })
  @ApiOkResponse({ standardSchema: ingestAnswer })
  async nmea(@Req() request: Request): Promise<IngestAnswer> {
    const roverId = this.keys.authorise(request.headers.authorization);
    this.expectType(request, 'text/plain');
    const { date } = request.url.includes('?') ? checked(ingestQuery, request.query) : {};
    return this.ingest.sentences(roverId, await readBody(request), date);
  }

  /** Epochs that were put together elsewhere. */
  @Post('epochs')
  @HttpCode(200)
  @ApiBody({ schema: epochsSchema })
  @ApiOkResponse({ standardSchema: ingestAnswer })
  async epochs(@Req() request: Request): Promise<IngestAnswer> {
    const roverId = this.keys.authorise(request.headers.authorization);
    this.expectType(request, 'application/json');
    const { epochs } = checked(ingestEpochsBody, parsed(await readBody(request)));
    return this.ingest.epochs(roverId, epochs);
  }

  private expectType(request: Request, type: string): void {
    if (!request.headers['content-type']?.startsWith(type))
      throw new ProblemException(415, 'unsupportedMediaType', `Send this as Content-Type: ${type}.`);
  }
}

function parsed(body: Buffer): unknown {
  try {
    return JSON.parse(body.toString('utf8'));
  } catch {
    throw new ProblemException(400, 'badRequest', 'The body is not JSON.');
  }
}
