import { Controller, Get, Inject, Req, Res } from '@nestjs/common';
import { ApiOperation, ApiProduces, ApiResponse, ApiTags } from '@nestjs/swagger';
import type { Request, Response } from 'express';
import { problem } from '@masswright/contracts';
import { SignedIn, type SignedInContext } from '../platform/request-context';
import { EventHub, type EventStream } from './event-hub';

/** Often enough that no proxy takes a quiet stream for a dead one. */
const heartbeatMs = 15_000;
const mostUnreadBytes = 1_000_000;

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
    const write = (text: string) => {
      if (response.writableEnded || response.destroyed) return;
      // A reader that doesn't read would have us keep everything for it; it can come back and read the state anew.
      if (response.writableLength > mostUnreadBytes) response.destroy();
      else response.write(text);
    };
    const heartbeat = setInterval(() => {
      write(': still here\n\n');
      void this.hub.checkSession(stream);
    }, heartbeatMs);
    const stream: EventStream = {
      sessionId,
      userId,
      organisationId,
      send: (event) => write(`data: ${JSON.stringify(event)}\n\n`),
      end: () => {
        clearInterval(heartbeat);
        response.end();
      },
    };
    response.on('error', () => response.destroy());
    const remove = this.hub.add(stream);
    request.once('close', () => {
      clearInterval(heartbeat);
      remove();
    });
  }
}
