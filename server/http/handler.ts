import type * as z from 'zod';
import type { Endpoint } from '../../shared/api/endpoint.ts';
import type { AuditEvent } from '../../shared/domain/audit-events.ts';
import type { SignedInActor } from '../db/actor.ts';
import type { Reader, Transaction } from '../db/database.ts';
import type { Notice } from '../notices/notice.ts';

/** What `main.ts` hands in, so that tests can hand in something else. */
export type Services = {
  readonly now: () => Date;
  /** A fresh UUID. */
  readonly newId: () => string;
  /** Random bytes for tokens, as hex. */
  readonly newToken: () => string;
  /** Where the app is reached, without a slash at the end; for links in mails. */
  readonly publicAddress: string;
};

export type UploadedFile = { readonly name: string; readonly content: Buffer };

/** Anonymous on endpoints whose access is `public`: those have handlers of their own in `features/session`. */
type Given<E extends Endpoint> = {
  readonly actor: SignedInActor;
  readonly params: z.output<E['params']>;
  readonly query: z.output<E['query']>;
  readonly body: z.output<E['body']>;
  readonly services: Services;
};

/** One entry of the decision log. `chain`: a study's id, or `system`. */
export type AuditRecord = { readonly chain: string; readonly event: AuditEvent };

export type CommandResult<E extends Endpoint> = {
  readonly reply: z.input<E['reply']>;
  /** At least one: a change without a record does not compile. */
  readonly audit: readonly [AuditRecord, ...AuditRecord[]];
  readonly notices: readonly Notice[];
};

export type QueryHandler<E extends Endpoint = Endpoint> = {
  readonly type: 'query';
  readonly endpoint: E;
  readonly run: (given: Given<E> & { readonly reader: Reader }) => Promise<z.input<E['reply']>>;
};
export type CommandHandler<E extends Endpoint = Endpoint> = {
  readonly type: 'command';
  readonly endpoint: E;
  readonly run: (
    given: Given<E> & { readonly tx: Transaction; readonly file: UploadedFile | null },
  ) => Promise<CommandResult<E>>;
};
/** A write that is not part of the record, such as where nodes stand on the canvas. Says why it is not. */
export type UnrecordedHandler<E extends Endpoint = Endpoint> = {
  readonly type: 'unrecorded';
  readonly endpoint: E;
  readonly why: string;
  readonly run: (given: Given<E> & { readonly tx: Transaction }) => Promise<z.input<E['reply']>>;
};
// biome-ignore lint/suspicious/noExplicitAny: a list of handlers holds handlers of different endpoints.
export type Handler = QueryHandler<any> | CommandHandler<any> | UnrecordedHandler<any>;

/** A read: it is given a `Reader`, which can only select. */
export function defineQuery<E extends Endpoint>(endpoint: E, run: QueryHandler<E>['run']): QueryHandler<E> {
  return { type: 'query', endpoint, run };
}

/** A change: runs in one transaction with its log entries and the mails it owes. */
export function defineCommand<E extends Endpoint>(endpoint: E, run: CommandHandler<E>['run']): CommandHandler<E> {
  return { type: 'command', endpoint, run };
}

export function defineUnrecorded<E extends Endpoint>(
  endpoint: E,
  why: string,
  run: UnrecordedHandler<E>['run'],
): UnrecordedHandler<E> {
  return { type: 'unrecorded', endpoint, why, run };
}
