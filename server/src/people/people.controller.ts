import { Body, Controller, Get, HttpCode, Param, Patch, Post, Query } from '@nestjs/common';
import { ApiAcceptedResponse, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { PasswordResetsService } from '../auth/password-resets/password-resets.service';
import { CurrentActor, type Actor } from '../common/actor';
import { IdPipe } from '../common/id.pipe';
import { Roles, SessionOnly } from '../common/roles';
import { ListPeopleQuery, PeopleListDto, PersonDto, UpdatePersonDto } from './dto/person.dto';
import { PeopleService } from './people.service';

@ApiTags('people')
@SessionOnly()
@Controller('people')
export class PeopleController {
  constructor(
    private readonly people: PeopleService,
    private readonly resets: PasswordResetsService,
  ) {}

  @Get()
  @Roles('administrator')
  @ApiOkResponse({ type: PeopleListDto })
  async listPeople(@Query() { q }: ListPeopleQuery): Promise<PeopleListDto> {
    return { items: await this.people.list(q) };
  }

  /** Changes somebody's roles, or shuts or opens their account. Their sessions end at once. */
  @Patch(':id')
  @Roles('administrator')
  @ApiOkResponse({ type: PersonDto })
  updatePerson(
    @CurrentActor() actor: Actor,
    @Param('id', IdPipe) id: string,
    @Body() body: UpdatePersonDto,
  ): Promise<PersonDto> {
    return this.people.update(actor, id, body);
  }

  /** Mails a link with which the person chooses a new password. */
  @Post(':id/password-reset')
  @HttpCode(202)
  @Roles('administrator')
  @ApiAcceptedResponse()
  async sendPasswordReset(@CurrentActor() actor: Actor, @Param('id', IdPipe) id: string): Promise<void> {
    await this.resets.askFor(actor, await this.people.get(id));
  }
}
