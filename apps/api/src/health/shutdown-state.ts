import { Injectable } from '@nestjs/common';

/** Whether this process has begun to stop: then it is not ready, however well it is. */
@Injectable()
export class ShutdownState {
  private stopping = false;

  begin(): void {
    this.stopping = true;
  }

  check(): Promise<void> {
    return this.stopping ? Promise.reject(new Error('The process is stopping.')) : Promise.resolve();
  }
}
