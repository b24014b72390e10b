import 'reflect-metadata';
import { DataSource } from 'typeorm';
import { Assembly, AssemblyContribution, AssemblyDraft, Revision, RevisionContributor } from './entities/assemblies.js';
import { Decision, DecisionEvent } from './entities/decisions.js';
import { AuditEntry, Membership, Session, SignInFailure, Team, User } from './entities/people.js';
import { ReferenceValue, ReferenceValueVersion } from './entities/reference-values.js';
import { migrations } from './migrations/index.js';

/** A data source on the given database; migrations run only where they are asked for, and nothing is ever synchronised. */
export function makeDataSource(url: string): DataSource {
  return new DataSource({
    type: 'postgres',
    url,
    entities: [
      User,
      Team,
      Membership,
      Session,
      SignInFailure,
      AuditEntry,
      ReferenceValue,
      ReferenceValueVersion,
      Assembly,
      AssemblyDraft,
      AssemblyContribution,
      Revision,
      RevisionContributor,
      Decision,
      DecisionEvent,
    ],
    migrations,
    migrationsTableName: 'migrations',
    uuidExtension: 'pgcrypto',
    installExtensions: false,
    connectTimeoutMS: 5000,
    extra: { max: 20, idleTimeoutMillis: 30_000, statement_timeout: 30_000 },
    poolErrorHandler: () => {
      // A lost connection shows in the next query and in the health route; it must not end the process.
    },
  });
}
