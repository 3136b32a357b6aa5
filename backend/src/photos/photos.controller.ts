import {
  Controller,
  Get,
  Headers,
  Param,
  Post,
  Req,
  Res,
  StreamableFile,
  UseInterceptors,
} from '@nestjs/common';
import {
  ApiBody,
  ApiConsumes,
  ApiCreatedResponse,
  ApiHeader,
  ApiOkResponse,
  ApiProduces,
  ApiTags,
} from '@nestjs/swagger';
import { idParam } from '@hubtack/contracts/common.js';
import { photoList, type Photo } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import type { Request, Response } from 'express';
import { AllowRoles, CurrentViewer, type Viewer } from '../auth/access.js';
import { PhotosService } from './photos.service.js';
import { PhotoUploadInterceptor } from './upload.interceptor.js';

@ApiTags('lost fixes')
@Controller('lost-fixes/:id/photos')
export class PhotosController {
  constructor(private readonly photos: PhotosService) {}

  /** Up to four in all, JPEG, PNG or WebP by their content; all of a post are kept or none. Answers what is there now. */
  @Post()
  @AllowRoles('dispatcher', 'technician', 'crewChief')
  @UseInterceptors(PhotoUploadInterceptor)
  @ApiConsumes('multipart/form-data')
  @ApiHeader({ name: 'Idempotency-Key', required: false })
  @ApiBody({
    schema: {
      type: 'object',
      properties: { photos: { type: 'array', items: { type: 'string', format: 'binary' } } },
    },
  })
  @ApiCreatedResponse({ standardSchema: photoList })
  add(
    @CurrentViewer() viewer: Viewer,
    @Param('id', { schema: idParam }) id: number,
    @Req() request: Request,
    @Headers('idempotency-key') key: string | undefined,
  ): Promise<Photo[]> {
    const files = (request.files ?? []) as Express.Multer.File[];
    return this.photos.add(
      viewer,
      id,
      files.map(({ buffer }) => buffer),
      key,
    );
  }

  @Get(':photoId')
  @AllowRoles('dispatcher', 'technician', 'crewChief')
  @ApiProduces('image/webp')
  @ApiOkResponse({ schema: { type: 'string', format: 'binary' } })
  get(
    @CurrentViewer() viewer: Viewer,
    @Param('id', { schema: idParam }) id: number,
    @Param('photoId', { schema: idParam }) photoId: number,
    @Res({ passthrough: true }) response: Response,
  ): StreamableFile {
    const file = this.photos.open(viewer, id, photoId);
    // A photo never changes. Said only of one that is there: a refusal is not to be kept.
    response.setHeader('Cache-Control', 'private, max-age=31536000, immutable');
    return new StreamableFile(file, {
      type: 'image/webp',
      disposition: 'inline',
    });
  }
}
