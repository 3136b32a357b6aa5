import { Controller, Delete, Get, HttpCode, Param, Post, Req, UseInterceptors } from '@nestjs/common';
import {
  ApiAcceptedResponse,
  ApiBody,
  ApiConsumes,
  ApiNoContentResponse,
  ApiOkResponse,
  ApiTags,
} from '@nestjs/swagger';
import { idParam } from '@hubtack/contracts/common.js';
import {
  acceptedLog,
  logList,
  logWithDetail,
  type Log,
  type LogWithDetail,
} from '@hubtack/contracts/logs/log.js';
import type { Request } from 'express';
import { AllowRoles, CurrentViewer, type Viewer } from '../auth/access.js';
import { LogUploadInterceptor } from './log-upload.interceptor.js';
import { LogsService } from './logs.service.js';

@ApiTags('logs')
@Controller('logs')
export class LogsController {
  constructor(private readonly logs: LogsService) {}

  /** A receiver's sentence log, up to 100 MB. Answers once the file is on disk; it is read after that, one log at a time. */
  @Post()
  @HttpCode(202)
  @AllowRoles('dispatcher', 'technician')
  @UseInterceptors(LogUploadInterceptor)
  @ApiConsumes('multipart/form-data')
  @ApiBody({
    schema: {
      type: 'object',
      required: ['file'],
      properties: {
        file: { type: 'string', format: 'binary' },
        date: { type: 'string', format: 'date', description: 'UTC date of the first sentence' },
        roverId: { type: 'integer', description: 'Also enter the epochs into the history of this rover' },
      },
    },
  })
  @ApiAcceptedResponse({ standardSchema: acceptedLog })
  add(@CurrentViewer() viewer: Viewer, @Req() request: Request): Promise<{ id: number }> {
    return this.logs.accept(viewer, request.file, request.body);
  }

  /** The newest fifty. */
  @Get()
  @AllowRoles('dispatcher', 'technician')
  @ApiOkResponse({ standardSchema: logList })
  list(): { logs: Log[] } {
    return { logs: this.logs.list() };
  }

  @Get(':id')
  @AllowRoles('dispatcher', 'technician')
  @ApiOkResponse({ standardSchema: logWithDetail })
  get(@Param('id', { schema: idParam }) id: number): LogWithDetail {
    return this.logs.get(id);
  }

  /** Stops one that waits or is being read, which stays in the list as cancelled; any other is removed with what was read from it. */
  @Delete(':id')
  @HttpCode(204)
  @AllowRoles('dispatcher', 'technician')
  @ApiNoContentResponse()
  remove(@CurrentViewer() viewer: Viewer, @Param('id', { schema: idParam }) id: number): Promise<void> {
    return this.logs.remove(viewer, id);
  }
}
