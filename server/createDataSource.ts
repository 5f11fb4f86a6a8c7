import 'reflect-metadata';
import { DataSource } from 'typeorm';
import * as entities from './entities/index.js';
import { migrations } from './migrations/index.js';
import { SnakeNamingStrategy } from './SnakeNamingStrategy.js';

export function createDataSource(databaseUrl: string, options: { poolSize?: number } = {}): DataSource {
  return new DataSource({
    type: 'postgres',
    url: databaseUrl,
    entities: Object.values(entities),
    migrations,
    namingStrategy: new SnakeNamingStrategy(),
    synchronize: false,
    uuidExtension: 'pgcrypto',
    installExtensions: false,
    poolSize: options.poolSize ?? 10,
    connectTimeoutMS: 5_000,
    extra: { statement_timeout: 30_000, idle_in_transaction_session_timeout: 60_000 },
  });
}
