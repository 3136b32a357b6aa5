import {
  Controller,
  Get,
  Header,
  Headers,
  Param,
  Post,
  Req,
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
import type { Request } from 'express';
import { AllowRoles, CurrentViewer, type Viewer } from '../auth/access.js';
import { PhotosService } from './photos.service.js';
import { PhotoUpload } from './upload.interceptor.js';

@ApiTags('lost fixes')
@Controller('lost-fixes/:id/photos')
export class PhotosController {
  constructor(private readonly photos: PhotosService) {}

  /** Up to four in all, JPEG, PNG or WebP by their content; all of a post are kept or none. Answers what is there now. */
  @Post()
  @AllowRoles('dispatcher', 'technician', 'crewChief')
  @UseInterceptors(PhotoUpload())
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
  @Header('Cache-Control', 'private, max-age=31536000, immutable')
  @Header('X-Content-Type-Options', 'nosniff')
  @ApiProduces('image/webp')
  @ApiOkResponse({ schema: { type: 'string', format: 'binary' } })
  get(
    @CurrentViewer() viewer: Viewer,
    @Param('id', { schema: idParam }) id: number,
    @Param('photoId', { schema: idParam }) photoId: number,
  ): StreamableFile {
    return new StreamableFile(this.photos.open(viewer, id, photoId), {
      type: 'image/webp',
      disposition: 'inline',
    });
  }
}
