import { mkdirSync } from 'node:fs';
import { dirname } from 'node:path';
import { Global, Inject, Module, type OnApplicationShutdown } from '@nestjs/common';
import { migrateDatabase, openDatabase, type HubtackDatabase } from '@hubtack/drizzle/database.js';
import { ENVIRONMENT } from '../config/config.module.js';
import type { Environment } from '../config/environment.js';

export const DATABASE = Symbol('database');

@Global()
@Module({
  providers: [
    {
      provide: DATABASE,
      inject: [ENVIRONMENT],
      useFactory: (environment: Environment): HubtackDatabase => {
        mkdirSync(dirname(environment.DATABASE_FILE), { recursive: true });
        const database = openDatabase(environment.DATABASE_FILE);
        migrateDatabase(database);
        return database;
      },
    },
  ],
  exports: [DATABASE],
})
export class DatabaseModule implements OnApplicationShutdown {
  constructor(@Inject(DATABASE) private readonly database: HubtackDatabase) {}

  onApplicationShutdown(): void {
    this.database.$client.close();
  }
}
