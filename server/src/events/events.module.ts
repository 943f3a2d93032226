import { Module } from '@nestjs/common';
import { CapturesModule } from '../captures/captures.module';
import { CaptureEvents } from './capture-events.service';
import { EventAccess } from './event-access.service';
import { EventsController } from './events.controller';

@Module({
  imports: [CapturesModule],
  controllers: [EventsController],
  providers: [CaptureEvents, EventAccess],
})
export class EventsModule {}
