import { Injectable, type CanActivate, type ExecutionContext } from '@nestjs/common';
import type { Request } from 'express';
import { AppError } from './app-error';

const safeMethods = new Set(['GET', 'HEAD', 'OPTIONS']);

/** Refuses writes that another site's page sends with our visitor's cookie: the browser says where a request comes from, and must. */
@Injectable()
export class OriginGuard implements CanActivate {
  constructor(private readonly publicOrigin: string) {}

  canActivate(execution: ExecutionContext): boolean {
    const request = execution.switchToHttp().getRequest<Request>();
    if (safeMethods.has(request.method)) return true;
    const site = request.get('sec-fetch-site');
    const origin = request.get('origin');
    const isSameSite = site === undefined ? origin === this.publicOrigin : site === 'same-origin' && (origin === undefined || origin === this.publicOrigin);
    if (!isSameSite) {
      throw new AppError('cross-site', `Changes are taken only from ${this.publicOrigin}. Open the application there.`);
    }
    return true;
  }
}
