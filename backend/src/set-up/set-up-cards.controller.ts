import { Body, Controller, Get, Headers, Param, Post, Query } from '@nestjs/common';
import { ApiCreatedResponse, ApiHeader, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { idParam } from '@hubtack/contracts/common.js';
import {
  ground,
  groundQuery,
  setUpCard,
  setUpCardBody,
  setUpCardList,
  setUpCardQuery,
  setUpStart,
  type Ground,
  type GroundQuery,
  type SetUpCard,
  type SetUpCardBody,
  type SetUpStart,
} from '@hubtack/contracts/set-up/set-up-card.js';
import { AllowRoles, CurrentViewer, type Viewer } from '../auth/access.js';
import { TapsService } from '../taps/taps.service.js';
import { SetUpCardsService } from './set-up-cards.service.js';

@ApiTags('set-up')
@Controller('set-up-cards')
export class SetUpCardsController {
  constructor(
    private readonly cards: SetUpCardsService,
    private readonly taps: TapsService,
  ) {}

  @Get()
  @AllowRoles('dispatcher', 'technician', 'crewChief')
  @ApiOkResponse({ standardSchema: setUpCardList })
  list(
    @CurrentViewer() viewer: Viewer,
    @Query({ schema: setUpCardQuery }) query: { roverId: number },
  ): { cards: SetUpCard[] } {
    return { cards: this.cards.list(viewer, query.roverId) };
  }

  /** What a new card starts from. */
  @Get('start')
  @AllowRoles('dispatcher', 'technician', 'crewChief')
  @ApiOkResponse({ standardSchema: setUpStart })
  start(
    @CurrentViewer() viewer: Viewer,
    @Query({ schema: setUpCardQuery }) query: { roverId: number },
  ): SetUpStart {
    return this.cards.start(viewer, query.roverId);
  }

  /** Height of the ground under a pole of this height, by the rover's newest sentence. */
  @Get('ground')
  @AllowRoles('dispatcher', 'technician', 'crewChief')
  @ApiOkResponse({ standardSchema: ground })
  ground(@CurrentViewer() viewer: Viewer, @Query({ schema: groundQuery }) query: GroundQuery): Ground {
    return this.cards.ground(viewer, query);
  }

  @Get(':id')
  @AllowRoles('dispatcher', 'technician', 'crewChief')
  @ApiOkResponse({ standardSchema: setUpCard })
  get(@CurrentViewer() viewer: Viewer, @Param('id', { schema: idParam }) id: number): SetUpCard {
    return this.cards.get(viewer, id);
  }

  /** A card with doubts is refused (409, needsConfirmation) until they are confirmed. Sent again with the same Idempotency-Key it counts once. */
  @Post()
  @AllowRoles('technician', 'crewChief')
  @ApiHeader({ name: 'Idempotency-Key', required: false })
  @ApiCreatedResponse({ standardSchema: setUpCard })
  add(
    @CurrentViewer() viewer: Viewer,
    @Body({ schema: setUpCardBody }) body: SetUpCardBody,
    @Headers('idempotency-key') key: string | undefined,
  ): SetUpCard {
    return this.taps.once(viewer, key, 'POST /api/set-up-cards', () => this.cards.add(viewer, body));
  }
}
