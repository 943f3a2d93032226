import { Global, Module, type DynamicModule } from '@nestjs/common';
import type { Env } from './env.schema';

/** Injection token of the checked configuration: `constructor(@Inject(ENV) private readonly env: Env)`. */
export const ENV = Symbol('ENV');

@Global()
@Module({})
export class EnvModule {
  static with(env: Env): DynamicModule {
    return { module: EnvModule, providers: [{ provide: ENV, useValue: env }], exports: [ENV] };
  }
}
