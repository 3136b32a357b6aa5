import { Body, Controller, HttpCode, Param, Post } from '@nestjs/common';
import { ApiCreatedResponse, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import {
  importBody,
  importDone,
  importKind,
  importPreview,
  previewImportBody,
  type ImportBody,
  type ImportDone,
  type ImportKind,
  type ImportPreview,
  type PreviewImportBody,
} from '@hubtack/contracts/imports/import.js';
import { AllowRoles, CurrentViewer, type Viewer } from '../auth/access.js';
import { ImportsService } from './imports.service.js';

@ApiTags('imports')
@Controller('imports/:kind')
export class ImportsController {
  constructor(private readonly imports: ImportsService) {}

  /** What a list would do, row by row. Changes nothing. */
  @Post('preview')
  @HttpCode(200)
  @AllowRoles('dispatcher', 'technician')
  @ApiOkResponse({ standardSchema: importPreview })
  preview(
    @CurrentViewer() viewer: Viewer,
    @Param('kind', { schema: importKind }) kind: ImportKind,
    @Body({ schema: previewImportBody }) { text }: PreviewImportBody,
  ): ImportPreview {
    return this.imports.preview(viewer, kind, text);
  }

  /** Does what the preview said, all of it or nothing. */
  @Post()
  @AllowRoles('dispatcher', 'technician')
  @ApiCreatedResponse({ standardSchema: importDone })
  import(
    @CurrentViewer() viewer: Viewer,
    @Param('kind', { schema: importKind }) kind: ImportKind,
    @Body({ schema: importBody }) { text, fingerprint }: ImportBody,
  ): ImportDone {
    return this.imports.import(viewer, kind, text, fingerprint);
  }
}
