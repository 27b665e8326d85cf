import { asc, eq } from 'drizzle-orm';
import * as z from 'zod';
import type { StudyRole } from '../../shared/domain/ability.ts';
import { type AuditEvent, auditEventSchema, type ChainItemKind } from '../../shared/domain/audit-events.ts';
import { type RouteStatus, routeMoves } from '../../shared/domain/route-lifecycle.ts';
import type { StudyModel } from '../../shared/engine/model/study-model.ts';
import type { Reader } from './database.ts';
import { auditEntry } from './schema/decision-log.ts';
import { assembleModel } from './study-reads.ts';

/** A study as its decision log tells it. */
export type ReplayedStudy = {
  readonly title: string;
  readonly question: string;
  readonly model: StudyModel;
  /** By person id. */
  readonly members: Readonly<Record<string, StudyRole>>;
  /** By route id. */
  readonly routes: Readonly<Record<string, { readonly status: RouteStatus; readonly revision: number }>>;
};

type Facts = {
  study: { title: string; question: string };
  /** In order of creation: a map keeps the place of what is set again. */
  readonly items: Map<string, { readonly kind: ChainItemKind; readonly body: unknown }>;
  readonly members: Map<string, StudyRole>;
  readonly routes: Map<string, { status: RouteStatus; revision: number }>;
};

function applyEdit(facts: Facts, event: Extract<AuditEvent, { event: 'chain.edited' }>): void {
  for (const { kind, id, after } of event.changes) {
    if (after === null) facts.items.delete(id);
    else facts.items.set(id, { kind, body: after });
    if (kind !== 'route') continue;
    const before = facts.routes.get(id);
    if (after === null) facts.routes.delete(id);
    else if (!before) facts.routes.set(id, { status: 'draft', revision: 1 });
    else {
      const revision = before.status === 'approved' ? before.revision + 1 : before.revision;
      facts.routes.set(id, { status: routeMoves.edit.to, revision });
    }
  }
}

function move(facts: Facts, routeIds: readonly string[], status: RouteStatus): void {
  for (const id of routeIds) {
    const route = facts.routes.get(id);
    if (route) facts.routes.set(id, { ...route, status });
  }
}

/** Applies one event; what changes no state of the study (a ruling, a verification, a sign-in) leaves it as it is. */
function apply(facts: Facts, event: AuditEvent): void {
  switch (event.event) {
    case 'study.created':
      facts.study = event.study;
      break;
    case 'study.renamed':
      if (event.after) facts.study = event.after;
      break;
    case 'member.added':
      facts.members.set(event.personId, event.role);
      break;
    case 'member.removed':
      facts.members.delete(event.personId);
      break;
    case 'chain.edited':
      applyEdit(facts, event);
      break;
    case 'submission.opened':
      move(facts, event.routeIds, routeMoves.submit.to);
      break;
    case 'submission.signed':
      move(facts, event.routeIds, routeMoves.approve.to);
      break;
    case 'submission.returned':
      move(facts, event.routeIds, routeMoves.return.to);
      break;
    case 'submission.withdrawn':
      move(facts, event.routeIds, routeMoves.withdraw.to);
      break;
  }
}

/**
 * What a list of log entries of one study, oldest first, amounts to.
 *
 * @throws ZodError when an item in the log is not what its kind asks for.
 */
export function replay(events: readonly AuditEvent[]): ReplayedStudy {
  const facts: Facts = {
    study: { title: '', question: '' },
    items: new Map(),
    members: new Map(),
    routes: new Map(),
  };
  for (const event of events) apply(facts, event);
  return {
    ...facts.study,
    model: assembleModel([...facts.items.values()]),
    members: Object.fromEntries(facts.members),
    routes: Object.fromEntries(facts.routes),
  };
}

const payloadSchema = z.object({ event: auditEventSchema });

/** Makes a study anew from nothing but its decision log. */
export async function replayLog(reader: Reader, studyId: string): Promise<ReplayedStudy> {
  const entries = await reader
    .select({ payload: auditEntry.payload })
    .from(auditEntry)
    .where(eq(auditEntry.chain, studyId))
    .orderBy(asc(auditEntry.seq));
  return replay(entries.map(({ payload }) => payloadSchema.parse(JSON.parse(payload)).event));
}
