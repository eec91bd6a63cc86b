import { Inject } from '@nestjs/common';
import type { Logger } from '@masswright/logs';

const loggerToken = Symbol('logger');
export const loggerProvider = (logger: Logger) => ({ provide: loggerToken, useValue: logger });
export const InjectLogger = () => Inject(loggerToken);
