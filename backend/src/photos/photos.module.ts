import { Module } from '@nestjs/common';
import { LostFixesModule } from '../lost-fixes/lost-fixes.module.js';
import { PhotoFiles } from './photo.files.js';
import { PhotosController } from './photos.controller.js';
import { PhotosService } from './photos.service.js';

@Module({
  imports: [LostFixesModule],
  controllers: [PhotosController],
  providers: [PhotoFiles, PhotosService],
})
export class PhotosModule {}
