import { Injectable } from '@nestjs/common';

/** Throws when the component can't do its work; the message goes to the log, not to the answer. */
export type ReadinessCheck = () => Promise<void>;

/** The components on which "ready" depends; a module adds its own in `onModuleInit`. */
@Injectable()
export class ReadinessRegistry {
  readonly #checks = new Map<string, ReadinessCheck>();

  get checks(): ReadonlyMap<string, ReadinessCheck> {
    return this.#checks;
  }

  add(component: string, check: ReadinessCheck): void {
    if (this.#checks.has(component)) throw new Error(`the component ${component} has a check already`);
    this.#checks.set(component, check);
  }
}
