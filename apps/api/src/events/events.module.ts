import { Module } from '@nestjs/common';
import { EventHub } from './event-hub';
import { EventsController } from './events.controller';

@Module({ controllers: [EventsController], providers: [EventHub], exports: [EventHub] })
export class EventsModule {}
