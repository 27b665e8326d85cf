import { randomUUID } from 'node:crypto';
import { asc, eq } from 'drizzle-orm';
import { auditEntry } from '../../server/db/schema/decision-log.ts';
import { outbox } from '../../server/db/schema/outbox.ts';
import type { Caller } from '../../server/scripts/api-caller.ts';
import { addMember, type ChainEdit, createStudy, editChain, getStudy, type Study } from '../../shared/api/studies.ts';
import {
  getSubmission,
  openSubmission,
  ruleOnAssumption,
  type Submission,
  signatureMeanings,
  signSubmission,
} from '../../shared/api/submissions.ts';
import type { StudyRole } from '../../shared/domain/ability.ts';
import {
  type AuditEvent,
  auditEventSchema,
  type ChainItemKind,
  type Ruling,
} from '../../shared/domain/audit-events.ts';
import type {
  MeasuredValue,
  OperatingPoint,
  Quantity,
  Route,
  StudyModel,
} from '../../shared/engine/model/study-model.ts';
import { type BuiltPerson, person, testPassword } from './builders.ts';
import type { TestApp } from './test-app.ts';

export type TeamMember = Caller & { readonly person: BuiltPerson };
type Place =
  | 'engineer'
  | 'colleague'
  | 'manager'
  | 'secondManager'
  | 'studyAuditor'
  | 'auditor'
  | 'administrator'
  | 'outsider';
export type Team = Readonly<Record<Place, TeamMember>> & { readonly app: TestApp };

const roles: Partial<Record<Place, StudyRole>> = {
  colleague: 'engineer',
  manager: 'manager',
  secondManager: 'manager',
  studyAuditor: 'auditor',
};

/** One person for each way to stand to a study, each signed in. */
export async function gatherTeam(app: TestApp): Promise<Team> {
  const places: readonly Place[] = [
    'engineer',
    'colleague',
    'manager',
    'secondManager',
    'studyAuditor',
    'auditor',
    'administrator',
    'outsider',
  ];
  const members = await Promise.all(
    places.map(async (place) => {
      const built = await person(app.db, {
        isAuditor: place === 'auditor',
        isAdministrator: place === 'administrator',
      });
      return [place, { ...(await app.as(built)), person: built }] as const;
    }),
  );
  return { app, ...(Object.fromEntries(members) as Record<Place, TeamMember>) };
}

/** A study of the engineer in which everybody but the outsider and the administrator has a role. */
export async function newStudy(team: Team): Promise<string> {
  const reply = await team.engineer.call(createStudy, { body: { title: 'Rod in a duct', question: 'How long?' } });
  for (const [place, role] of Object.entries(roles) as [Place, StudyRole][]) {
    await team.engineer.call(addMember, {
      params: { studyId: reply.body.id },
      body: { personId: team[place].person.id, role },
    });
  }
  return reply.body.id;
}

export function value(number: number, u = 0, unit = '1'): MeasuredValue {
  return {
    text: String(number),
    value: number,
    unit,
    uncertaintyText: String(u),
    uncertainty: { form: 'standard', u },
  };
}

/** The smallest chain with a balance: stated a, and b = 2 a at one operating point. */
export type SmallChain = {
  readonly point: OperatingPoint;
  readonly source: Quantity;
  readonly target: Quantity;
  readonly stated: Extract<Route, { kind: 'stated-value' }>;
  readonly balance: Extract<Route, { kind: 'balance' }>;
};

export function smallChain(): SmallChain {
  const geometry = { family: 'tube' as const, description: '', ratios: [] };
  const point: OperatingPoint = {
    id: randomUUID(),
    name: 'Plant',
    scale: 'plant',
    geometry,
    fluid: 'water',
    entries: [],
  };
  const quantity = (symbol: string, name: string): Quantity => ({
    id: randomUUID(),
    symbol,
    name,
    unit: '1',
    operatingPointId: point.id,
    adoptedRouteId: null,
    limit: null,
    unsafeSide: null,
    note: '',
  });
  const source = quantity('a', 'Source ratio');
  const target = quantity('b', 'Target ratio');
  const base = { rationale: '', justifications: {} };
  return {
    point,
    source,
    target,
    stated: {
      ...base,
      id: randomUUID(),
      quantityId: source.id,
      name: 'Data sheet',
      kind: 'stated-value',
      value: value(3, 0.1),
      evidence: 'Sheet 7',
    },
    balance: {
      ...base,
      id: randomUUID(),
      quantityId: target.id,
      name: 'Doubling',
      kind: 'balance',
      expression: '2 * a',
      bindings: { a: { from: 'quantity', quantityId: source.id } },
    },
  };
}

type Item = { readonly id: string };

export function edit<Body extends NonNullable<ChainEdit['body']>>(
  kind: ChainItemKind,
  body: Body,
  expectedRevision: number,
): ChainEdit {
  return { kind, id: body.id, expectedRevision, body };
}

export function removal(kind: ChainItemKind, { id }: Item, expectedRevision = 1): ChainEdit {
  return { kind, id, expectedRevision, body: null };
}

/** Everything of a model as new items, in the order of its lists. */
export function asEdits(
  model: Pick<StudyModel, 'operatingPoints' | 'quantities' | 'routes' | 'inputCorrelations'>,
): ChainEdit[] {
  return [
    ...model.operatingPoints.map((body) => edit('operating-point', body, 0)),
    ...model.quantities.map((body) => edit('quantity', body, 0)),
    ...model.routes.map((body) => edit('route', body, 0)),
    ...model.inputCorrelations.map((body) => edit('input-correlation', body, 0)),
  ];
}

export function editsOf({ point, source, target, stated, balance }: SmallChain): ChainEdit[] {
  return asEdits({
    operatingPoints: [point],
    quantities: [source, target],
    routes: [stated, balance],
    inputCorrelations: [],
  });
}

export function send(caller: Caller, studyId: string, edits: readonly ChainEdit[], reason = '') {
  return caller.call(editChain, {
    params: { studyId },
    body: { summary: 'Changed the chain', reason, edits: [...edits] },
  });
}

/** A study that holds the small chain. */
export async function studyWithChain(team: Team): Promise<{ readonly studyId: string; readonly chain: SmallChain }> {
  const studyId = await newStudy(team);
  const chain = smallChain();
  const reply = await send(team.engineer, studyId, editsOf(chain));
  if (reply.status !== 200) throw new Error(reply.problem.sentence);
  return { studyId, chain };
}

export async function seen(caller: Caller, studyId: string): Promise<Study> {
  return (await caller.call(getStudy, { params: { studyId } })).body;
}

export async function submit(caller: Caller, studyId: string, target: Item, note = '') {
  const { revision } = await seen(caller, studyId);
  return caller.call(openSubmission, { params: { studyId }, body: { targetQuantityId: target.id, revision, note } });
}

/** A study whose small chain lies with its managers. */
export async function studyInReview(team: Team) {
  const { studyId, chain } = await studyWithChain(team);
  const reply = await submit(team.engineer, studyId, chain.target);
  if (reply.status !== 200) throw new Error(reply.problem.sentence);
  return { studyId, chain, submission: reply.body };
}

export const accepted: Ruling = { ruling: 'accepted', comment: '', condition: null };

export function assumptionsOf(submission: Submission): { readonly routeId: string; readonly assumptionKey: string }[] {
  return submission.snapshot.routeIds.flatMap((routeId) =>
    (submission.snapshot.evaluation.routes[routeId]?.assumptions ?? []).map(({ key }) => ({
      routeId,
      assumptionKey: key,
    })),
  );
}

export async function acceptAll(caller: Caller, submission: Submission): Promise<void> {
  for (const assumption of assumptionsOf(submission)) {
    const params = { submissionId: submission.id };
    const reply = await caller.call(ruleOnAssumption, { params, body: { ...assumption, ruling: accepted } });
    if (reply.status !== 200) throw new Error(reply.problem.sentence);
  }
}

/** What the decision log says of a chain, in order. */
export async function logOf(
  app: TestApp,
  chain: string,
): Promise<{ readonly actorId: string; readonly event: AuditEvent }[]> {
  const rows = await app.db.select().from(auditEntry).where(eq(auditEntry.chain, chain)).orderBy(asc(auditEntry.seq));
  return rows.map(({ actorId, payload }) => ({ actorId, event: auditEventSchema.parse(JSON.parse(payload).event) }));
}

/** The mails owed about a submission. */
export async function owedFor(app: TestApp, submissionId: string) {
  const rows = await app.db.select().from(outbox);
  return rows.filter((row) => row.payload.submissionId === submissionId);
}

export function sign(
  caller: Caller,
  submission: Submission,
  facts: { readonly password?: string; readonly snapshotHash?: string } = {},
) {
  const body = {
    password: testPassword,
    meaning: signatureMeanings[0],
    snapshotHash: submission.snapshotHash,
    ...facts,
  };
  return caller.call(signSubmission, { params: { submissionId: submission.id }, body });
}

export async function seenSubmission(caller: Caller, { id }: Item): Promise<Submission> {
  return (await caller.call(getSubmission, { params: { submissionId: id } })).body;
}
