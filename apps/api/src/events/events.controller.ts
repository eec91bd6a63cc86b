import { Controller, Get, Inject, Req, Res } from '@nestjs/common';
import { ApiOperation, ApiProduces, ApiResponse, ApiTags } from '@nestjs/swagger';
import type { Request, Response } from 'express';
import { problem } from '@masswright/contracts';
import { SignedIn, type SignedInContext } from '../platform/request-context';
import { EventHub, type EventStream } from './event-hub';

/** Often enough that no proxy takes a quiet stream for a dead one. */
const heartbeatMs = 15_000;

@ApiTags('events')
@Controller('events')
export class EventsController {
  constructor(@Inject(EventHub) private readonly hub: EventHub) {}

  @Get()
  @ApiOperation({ summary: 'Changes as they happen: server-sent events, each a JSON object with a `type`' })
  @ApiProduces('text/event-stream')
  @ApiResponse({ status: 200, description: 'A stream that stays open until the session ends.', content: { 'text/event-stream': { schema: { type: 'string' } } } })
  @ApiResponse({ status: '4XX', description: 'Refused; `code` says why.', standardSchema: problem })
  open(@SignedIn() context: SignedInContext, @Req() request: Request, @Res() response: Response): void {
    response.status(200).set({ 'Content-Type': 'text/event-stream', 'Cache-Control': 'no-store', 'X-Accel-Buffering': 'no' });
    response.flushHeaders();
    const { sessionId, userId, organisationId } = context;
    const stream: EventStream = {
      sessionId,
      userId,
      organisationId,
      send: (event) => void response.write(`data: ${JSON.stringify(event)}\n\n`),
      end: () => void response.end(),
    };
    const remove = this.hub.add(stream);
    const heartbeat = setInterval(() => {
      response.write(': still here\n\n');
      void this.hub.checkSession(stream);
    }, heartbeatMs);
    request.once('close', () => {
      clearInterval(heartbeat);
      remove();
    });
  }
}
