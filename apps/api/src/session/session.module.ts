import { Module } from '@nestjs/common';
import { Passwords } from './passwords';
import { SessionController } from './session.controller';
import { SessionService } from './session.service';
import { Sessions } from './sessions';

@Module({
  controllers: [SessionController],
  providers: [Passwords, Sessions, SessionService],
  exports: [Passwords, Sessions, SessionService],
})
export class SessionModule {}
