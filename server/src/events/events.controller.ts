import { Controller, Get, Param, Res } from '@nestjs/common';
import { ApiOkResponse, ApiProduces, ApiTags } from '@nestjs/swagger';
import type { Response } from 'express';
import { filter, type Observable } from 'rxjs';
import { CaptureListService } from '../captures/capture-list.service';
import { CurrentPerson, type SignedInPerson } from '../common/actor';
import { IdPipe } from '../common/id.pipe';
import { Roles } from '../common/roles';
import { ShutdownState } from '../common/shutdown-state';
import type { CaptureEvent } from '../jobs/job-queue';
import { CaptureEvents } from './capture-events.service';
import { EVENT_ROLES, EventAccess } from './event-access.service';
import { EventStream, HEARTBEAT_MS } from './event-stream';

@ApiTags('events')
@Controller()
export class EventsController {
  constructor(
    private readonly events: CaptureEvents,
    private readonly captures: CaptureListService,
    private readonly access: EventAccess,
    private readonly shutdown: ShutdownState,
  ) {}

  @Get('events')
  @Roles(...EVENT_ROLES)
  @ApiProduces('text/event-stream')
  @ApiOkResponse({ schema: { type: 'string' } })
  streamEvents(@CurrentPerson() person: SignedInPerson, @Res() response: Response): void {
    this.pass(this.events.all, new EventStream(response), person, response);
  }

  @Get('captures/:id/events')
  @Roles(...EVENT_ROLES)
  @ApiProduces('text/event-stream')
  @ApiOkResponse({ schema: { type: 'string' } })
  async streamCaptureEvents(
    @Param('id', IdPipe) id: string,
    @CurrentPerson() person: SignedInPerson,
    @Res() response: Response,
  ): Promise<void> {
    const { state, progress, failure, record } = await this.captures.get(id);
    const stream = new EventStream(response);
    const own = this.events.all.pipe(filter(({ captureId }) => captureId === id));
    this.pass(own, stream, person, response);
    // Where it stands now, so that nothing is missed between the page's first look and the stream.
    stream.send('capture', { captureId: id, state, progress, failure, recordId: record?.id ?? null });
  }

  private pass(
    events: Observable<CaptureEvent>,
    stream: EventStream,
    person: SignedInPerson,
    response: Response,
  ): void {
    const end = () => stream.end();
    const subscription = events.subscribe({ next: (event) => stream.send('capture', event), complete: end });
    const beat = setInterval(() => {
      this.access.mayGoOn(person).then((isAllowed) => (isAllowed ? stream.beat() : stream.end()), end);
    }, HEARTBEAT_MS);
    this.shutdown.signal.addEventListener('abort', end, { once: true });
    response.once('close', () => {
      clearInterval(beat);
      subscription.unsubscribe();
      this.shutdown.signal.removeEventListener('abort', end);
    });
  }
}
