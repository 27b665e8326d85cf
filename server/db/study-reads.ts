import { and, asc, eq } from 'drizzle-orm';
import { studySubject } from '../../shared/domain/ability.ts';
import { type ChainItem, type ChainItemKind, chainItemSchema } from '../../shared/domain/audit-events.ts';
import type { RouteStatus } from '../../shared/domain/route-lifecycle.ts';
import { routeInForce, sliceModel } from '../../shared/engine/evaluate/upstream.ts';
import { emptyStudyModel, type StudyModel } from '../../shared/engine/model/study-model.ts';
import type { SignedInActor } from './actor.ts';
import { canonicalJson, sha256 } from './canonical-json.ts';
import type { Reader, Transaction } from './database.ts';
import { Problem } from './problem.ts';
import { people } from './schema/people.ts';
import { chainItems, memberships, routeStates, studies } from './schema/studies.ts';

export type StudyRow = typeof studies.$inferSelect;
export type ItemRow = typeof chainItems.$inferSelect;
export type RouteStateRow = typeof routeStates.$inferSelect;

/** To somebody who may not read a study it does not exist: the same words as for an id that nothing has. */
export function noSuchStudy(): Problem {
  return new Problem('not found', 'There is no such study, or you are not a member of it.');
}

export function requireReadable(actor: SignedInActor, studyId: string): void {
  if (actor.ability.cannot('read', studySubject(studyId))) throw noSuchStudy();
}

export async function readStudyRow(reader: Reader, studyId: string): Promise<StudyRow> {
  const [study] = await reader.select().from(studies).where(eq(studies.id, studyId));
  if (!study) throw noSuchStudy();
  return study;
}

/** Locks the study for the rest of the transaction: the first thing every command on a study does. */
export async function lockStudy(tx: Transaction, studyId: string): Promise<StudyRow> {
  const [study] = await tx.select().from(studies).where(eq(studies.id, studyId)).for('update');
  if (!study) throw noSuchStudy();
  return study;
}

/** Marks the study as changed; answers the new revision. */
export async function raiseRevision(tx: Transaction, study: StudyRow, now: Date): Promise<number> {
  const revision = study.revision + 1;
  await tx.update(studies).set({ revision, changedAt: now }).where(eq(studies.id, study.id));
  return revision;
}

export function readItems(reader: Reader, studyId: string): Promise<ItemRow[]> {
  return reader.select().from(chainItems).where(eq(chainItems.studyId, studyId)).orderBy(asc(chainItems.position));
}

const listOf = {
  'operating-point': 'operatingPoints',
  quantity: 'quantities',
  route: 'routes',
  test: 'tests',
  'input-correlation': 'inputCorrelations',
} as const satisfies Record<ChainItemKind, keyof StudyModel>;

/** The study model that a list of items amounts to, each validated by the schema of its kind. */
export function assembleModel(items: readonly { readonly kind: ChainItemKind; readonly body: unknown }[]): StudyModel {
  const model: Record<string, unknown[]> = {};
  for (const list of Object.values(listOf)) model[list] = [];
  for (const { kind, body } of items) {
    const item: ChainItem = chainItemSchema.parse({ kind, body });
    model[listOf[kind]]?.push(item.body);
  }
  return { ...emptyStudyModel, ...model } as StudyModel;
}

export function readRouteStates(reader: Reader, studyId: string): Promise<RouteStateRow[]> {
  return reader.select().from(routeStates).where(eq(routeStates.studyId, studyId));
}

/** Hash of everything that a route's quantity rests on, through this route. */
export function basisHash(model: StudyModel, routeId: string): string {
  const route = model.routes.find((one) => one.id === routeId);
  if (!route) throw new Error(`The model has no route ${routeId}.`);
  const adopted = {
    ...model,
    quantities: model.quantities.map((quantity) =>
      quantity.id === route.quantityId ? { ...quantity, adoptedRouteId: routeId } : quantity,
    ),
  };
  return sha256(canonicalJson(sliceModel(adopted, route.quantityId)));
}

export type RouteState = {
  readonly status: RouteStatus;
  readonly revision: number;
  readonly submissionId: string | null;
  readonly basisChanged: boolean;
};

/** Each route's state; an approved one says whether its basis is still what was signed. */
export function describeRouteStates(model: StudyModel, rows: readonly RouteStateRow[]): Record<string, RouteState> {
  const states: Record<string, RouteState> = {};
  for (const route of model.routes) {
    const row = rows.find((one) => one.routeId === route.id);
    states[route.id] = {
      status: row?.status ?? 'draft',
      revision: row?.revision ?? 1,
      submissionId: row?.submissionId ?? null,
      basisChanged: row?.status === 'approved' && row.signedBasisHash !== basisHash(model, route.id),
    };
  }
  return states;
}

/** How many quantities have a route in force that is approved on an unchanged basis, and how many are in review. */
export function countStates(model: StudyModel, states: Readonly<Record<string, RouteState>>) {
  const inForce = model.quantities
    .map((quantity) => routeInForce(model, quantity.id))
    .filter((route) => route !== null);
  const of = (wanted: (state: RouteState) => boolean) =>
    inForce.filter((route) => {
      const state = states[route.id];
      return state !== undefined && wanted(state);
    }).length;
  return {
    quantityCount: model.quantities.length,
    approvedCount: of((state) => state.status === 'approved' && !state.basisChanged),
    inReviewCount: of((state) => state.status === 'in review'),
  };
}

export function readMembers(reader: Reader, studyId: string) {
  return reader
    .select({ personId: memberships.personId, name: people.name, role: memberships.role })
    .from(memberships)
    .innerJoin(people, eq(people.id, memberships.personId))
    .where(eq(memberships.studyId, studyId))
    .orderBy(asc(people.name));
}

/** The active technical managers of a study, who are told of a submission. */
export async function managersOf(reader: Reader, studyId: string): Promise<{ personId: string; name: string }[]> {
  return reader
    .select({ personId: people.id, name: people.name })
    .from(memberships)
    .innerJoin(people, eq(people.id, memberships.personId))
    .where(and(eq(memberships.studyId, studyId), eq(memberships.role, 'manager'), eq(people.isActive, true)));
}
