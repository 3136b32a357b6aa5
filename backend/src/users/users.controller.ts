import { Body, Controller, Get, HttpCode, Param, Post, Put } from '@nestjs/common';
import { ApiCreatedResponse, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { idParam } from '@hubtack/contracts/common.js';
import {
  changeUserBody,
  invitedUser,
  inviteUserBody,
  user,
  userList,
  type ChangeUserBody,
  type InvitedUser,
  type InviteUserBody,
  type User,
} from '@hubtack/contracts/users/user.js';
import { AllowRoles, CurrentViewer, type Viewer } from '../auth/access.js';
import { UsersService } from './users.service.js';

@ApiTags('users')
@AllowRoles()
@Controller('users')
export class UsersController {
  constructor(private readonly users: UsersService) {}

  @Get()
  @ApiOkResponse({ standardSchema: userList })
  list(): User[] {
    return this.users.list();
  }

  /** Invites by e-mail. */
  @Post()
  @ApiCreatedResponse({ standardSchema: invitedUser })
  invite(
    @CurrentViewer() viewer: Viewer,
    @Body({ schema: inviteUserBody }) body: InviteUserBody,
  ): Promise<InvitedUser> {
    return this.users.invite(viewer, body);
  }

  @Post(':id/invite')
  @HttpCode(200)
  @ApiOkResponse({ standardSchema: invitedUser })
  inviteAgain(
    @CurrentViewer() viewer: Viewer,
    @Param('id', { schema: idParam }) id: number,
  ): Promise<InvitedUser> {
    return this.users.inviteAgain(viewer, id);
  }

  @Put(':id')
  @ApiOkResponse({ standardSchema: user })
  change(
    @CurrentViewer() viewer: Viewer,
    @Param('id', { schema: idParam }) id: number,
    @Body({ schema: changeUserBody }) body: ChangeUserBody,
  ): User {
    return this.users.change(viewer, id, body);
  }
}
