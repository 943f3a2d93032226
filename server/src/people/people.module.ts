import { Global, Module } from '@nestjs/common';
import { PasswordResetsController } from '../auth/password-resets/password-resets.controller';
import { PasswordResetsService } from '../auth/password-resets/password-resets.service';
import { PeopleController } from './people.controller';
import { PeopleService } from './people.service';

@Global()
@Module({
  controllers: [PeopleController, PasswordResetsController],
  providers: [PeopleService, PasswordResetsService],
  exports: [PeopleService],
})
export class PeopleModule {}
