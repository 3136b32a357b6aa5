import { Body, Controller, Get, Param, Post, Put } from '@nestjs/common';
import { ApiCreatedResponse, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { idParam } from '@hubtack/contracts/common.js';
import {
  changeSiteBody,
  site,
  siteBody,
  siteList,
  type ChangeSiteBody,
  type Site,
  type SiteBody,
} from '@hubtack/contracts/sites/site.js';
import { AllowRoles, CurrentViewer, type Viewer } from '../auth/access.js';
import { SitesService } from './sites.service.js';

@ApiTags('sites')
@Controller('sites')
export class SitesController {
  constructor(private readonly sites: SitesService) {}

  @Get()
  @AllowRoles('dispatcher', 'technician', 'crewChief')
  @ApiOkResponse({ standardSchema: siteList })
  list(@CurrentViewer() viewer: Viewer): Site[] {
    return this.sites.list(viewer);
  }

  @Get(':id')
  @AllowRoles('dispatcher', 'technician', 'crewChief')
  @ApiOkResponse({ standardSchema: site })
  get(@CurrentViewer() viewer: Viewer, @Param('id', { schema: idParam }) id: number): Site {
    return this.sites.get(viewer, id);
  }

  @Post()
  @AllowRoles('dispatcher', 'technician')
  @ApiCreatedResponse({ standardSchema: site })
  add(@CurrentViewer() viewer: Viewer, @Body({ schema: siteBody }) body: SiteBody): Site {
    return this.sites.add(viewer, body);
  }

  @Put(':id')
  @AllowRoles('dispatcher', 'technician')
  @ApiOkResponse({ standardSchema: site })
  change(
    @CurrentViewer() viewer: Viewer,
    @Param('id', { schema: idParam }) id: number,
    @Body({ schema: changeSiteBody }) body: ChangeSiteBody,
  ): Site {
    return this.sites.change(viewer, id, body);
  }
}
