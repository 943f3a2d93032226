import { Global, Injectable, Module } from '@nestjs/common';

/** Tells everybody that the process is about to end; streams that stay open listen to `signal`. */
@Injectable()
export class ShutdownState {
  readonly #controller = new AbortController();

  get signal(): AbortSignal {
    return this.#controller.signal;
  }

  get isShuttingDown(): boolean {
    return this.#controller.signal.aborted;
  }

  begin(): void {
    this.#controller.abort();
  }
}

@Global()
@Module({ providers: [ShutdownState], exports: [ShutdownState] })
export class ShutdownModule {}
