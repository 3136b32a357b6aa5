import { Global, Module, type DynamicModule } from '@nestjs/common';
import type { Environment } from './environment.js';
import { loadSecrets } from './secrets.js';

export const ENVIRONMENT = Symbol('environment');
export const SECRETS = Symbol('secrets');

/** The environment, parsed once by whoever starts the application, and the secrets that go with it. */
@Global()
@Module({})
export class ConfigModule {
  static of(environment: Environment): DynamicModule {
    return {
      module: ConfigModule,
      providers: [
        { provide: ENVIRONMENT, useValue: environment },
        { provide: SECRETS, useFactory: () => loadSecrets(environment) },
      ],
      exports: [ENVIRONMENT, SECRETS],
    };
  }
}
