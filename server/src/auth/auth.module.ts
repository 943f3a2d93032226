import { Global, Module } from '@nestjs/common';
import { SessionAnswer } from './session-answer.service';
import { SessionController } from './session.controller';
import { SignInService } from './sign-in.service';

@Global()
@Module({
  controllers: [SessionController],
  providers: [SessionAnswer, SignInService],
  exports: [SessionAnswer],
})
export class AuthModule {}
