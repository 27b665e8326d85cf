import { createHash, randomUUID } from 'node:crypto';
import type { RowDataPacket } from 'mysql2';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { appendEntry } from '../../../server/db/append-entry.ts';
import { entryHash, verifyChain } from '../../../server/db/verify-chain.ts';
import type { Caller } from '../../../server/scripts/api-caller.ts';
import { listLogEntries, verifyLog } from '../../../shared/api/decision-log.ts';
import { addMember, createStudy } from '../../../shared/api/studies.ts';
import type { AuditEvent } from '../../../shared/domain/audit-events.ts';
import { type BuiltPerson, person } from '../../support/builders.ts';
import { startTestApp, type TestApp } from '../../support/test-app.ts';

let app: TestApp;
let engineer: Caller;
let auditor: Caller;
let ada: BuiltPerson;
let studyId: string;

beforeEach(async () => {
  app = await startTestApp();
  ada = await person(app.db, { name: 'Ada Voss' });
  const noor = await person(app.db, { name: 'Noor Haas' });
  engineer = await app.as(ada);
  auditor = await app.as(noor);
  const study = await engineer.call(createStudy, { body: { title: 'Wall transfer', question: '100 % of k?' } });
  studyId = study.body.id;
  await engineer.call(addMember, { params: { studyId }, body: { personId: noor.id, role: 'auditor' } });
});
afterEach(() => app.stop());

function append(event: AuditEvent): Promise<void> {
  return app.db.transaction((tx) =>
    appendEntry(tx, { chain: studyId, actorId: ada.id, actorName: ada.name, event, salt: 'ab'.repeat(16) }),
  );
}

const edited = (summary: string): AuditEvent => ({ event: 'chain.edited', summary, reason: '', changes: [] });
const verify = (caller = auditor) => caller.call(verifyLog, { params: { studyId } });
const list = async (query: Record<string, string | number> = {}, caller = auditor) =>
  (await caller.call(listLogEntries, { params: { studyId }, query })).body;

describe('reading', () => {
  it('shows the newest first, with who did it as they were called then', async () => {
    await app.fresh.admin.query("UPDATE people SET name = 'Ada Berg' WHERE id = ?", [ada.id]);

    const { entries, total, hasMore } = await list();

    expect(entries.map((entry) => [entry.seq, entry.event.event, entry.actorName])).toEqual([
      [3, 'member.added', 'Ada Voss'],
      [2, 'member.added', 'Ada Voss'],
      [1, 'study.created', 'Ada Voss'],
    ]);
    expect([total, hasMore]).toEqual([3, false]);
    expect(entries[0]?.at).toMatch(/^\d{4}-\d\d-\d\d \d\d:\d\d:\d\d\.\d{6}$/);
  });

  it('filters by kind, by person and by text, in which % and _ are only characters', async () => {
    await append(edited('Raised U to 7 % of h_w'));

    expect((await list({ event: 'member.added' })).total).toBe(2);
    expect((await list({ actorId: randomUUID() })).total).toBe(0);
    expect((await list({ actorId: ada.id })).total).toBe(4);
    expect((await list({ text: 'raised u' })).entries.map((entry) => entry.seq)).toEqual([4]);
    expect((await list({ text: '7 %' })).total).toBe(1);
    expect((await list({ text: 'h_w' })).total).toBe(1);
    expect((await list({ text: '7_%' })).total).toBe(0);
  });

  it('pages by a hundred without a gap', async () => {
    for (let count = 0; count < 105; count += 1) await append(edited(`Edit ${count}`));

    const first = await list();
    const second = await list({ before: first.entries.at(-1)?.seq ?? 0 });

    expect([first.entries.length, first.hasMore, first.total]).toEqual([100, true, 108]);
    expect([second.entries.length, second.hasMore]).toEqual([8, false]);
    expect([...first.entries, ...second.entries].map((entry) => entry.seq)).toEqual(
      Array.from({ length: 108 }, (_, index) => 108 - index),
    );
  });

  it('does not let in who is not a member, nor say whether the study exists', async () => {
    const stranger = await app.as(await person(app.db));
    const read = (id: string) => stranger.call(listLogEntries, { params: { studyId: id }, query: {} });

    const [real, invented] = [await read(studyId), await read(randomUUID())];

    expect(real.status).not.toBe(200);
    expect([real.status, real.problem]).toEqual([invented.status, invented.problem]);
    expect((await verify(stranger)).status).toBe(real.status);
  });
});

describe('verifying', () => {
  it('hashes the parts of an entry in the layout that is written down, so that others can check a copy', () => {
    const entry = {
      chain: 'system',
      seq: 1,
      at: '2026-01-05 08:00:00.000000',
      actorId: '10000000-0000-4000-8000-000000000001',
      kind: 'person.signed-in',
      prevHash: Buffer.alloc(32),
      payloadHash: createHash('sha256').update('{}').digest(),
    };

    // Made with `printf … | sha256sum` from the table in docs/decisions/0002-decision-log.md.
    expect(entryHash(entry).toString('hex')).toBe('8df8c359bffc1dfa60fa4dbb3702f32286d39b169e1d4fa00f81a79c60cb6723');
  });

  it('is refused to an engineer of the study, with the reason', async () => {
    const reply = await verify(engineer);

    expect(reply.status).toBe(403);
    expect(reply.problem.sentence).toContain('Only an auditor of this study may verify the decision log');
    expect((await list()).total).toBe(3);
  });

  it('finds an untouched log whole, and is itself in the log', async () => {
    const reply = await verify();

    expect(reply.body).toMatchObject({ whole: true, entries: 3, broken: null });
    const [latest] = (await list()).entries;
    expect(latest).toMatchObject({
      seq: 4,
      actorName: 'Noor Haas',
      event: { event: 'log.verified', entries: 3, whole: true, headHash: reply.body.headHash },
    });
    expect((await verify()).body).toMatchObject({ whole: true, entries: 4 });
  });

  it('keeps one unbroken chain when twenty write at the same moment', async () => {
    const writes = Array.from({ length: 20 }, (_, count) => append(edited(`At once ${count}`)));
    const outcomes = await Promise.allSettled(writes);

    expect(outcomes.filter((outcome) => outcome.status === 'fulfilled')).toHaveLength(20);
    expect((await verify()).body).toMatchObject({ whole: true, entries: 23 });
  });

  it('keeps Greek letters, superscripts, emoji and right-to-left text byte for byte', async () => {
    const summary = 'Δp ≤ 3 µm · k = 5×10⁻⁵ 😀 \u202eabc e\u0301 é';
    await append(edited(summary));

    expect((await list()).entries[0]?.event).toMatchObject({ summary });
    expect((await verify()).body.whole).toBe(true);
  });
});

describe('what the root of the database changes behind the triggers', () => {
  beforeEach(async () => {
    for (let count = 4; count <= 8; count += 1) await append(edited(`Edit ${count}`));
    for (const trigger of ['audit_entry_keep', 'audit_entry_stay', 'audit_entry_append']) {
      await app.fresh.admin.query(`DROP TRIGGER ${trigger}`);
    }
  });

  /** Verifying writes an entry, which takes the trigger that is gone here; so ask without the log. */
  const brokenAt = async () => (await verifyChain(app.db, studyId)).broken;
  const tamper = (sql: string) => app.fresh.admin.query(sql, [studyId]);

  it('is nothing at first', async () => {
    expect(await brokenAt()).toBeNull();
  });

  const faults: readonly [string, string, number, string][] = [
    [
      'one letter of what an entry says',
      "UPDATE audit_entry SET payload = REPLACE(payload, 'Edit 5', 'Edit 6') WHERE chain = ? AND seq = 5",
      5,
      'What entry 5 says is not what was written.',
    ],
    [
      'who did it',
      "UPDATE audit_entry SET actor_id = REPEAT('0', 36) WHERE chain = ? AND seq = 4",
      4,
      'Who, when or what kind entry 4 is was changed.',
    ],
    [
      'when it was, by a microsecond',
      'UPDATE audit_entry SET at = at + INTERVAL 1 MICROSECOND WHERE chain = ? AND seq = 7',
      7,
      'Who, when or what kind entry 7 is was changed.',
    ],
    [
      'the kind of an entry',
      "UPDATE audit_entry SET kind = 'log.verified' WHERE chain = ? AND seq = 6",
      6,
      'Who, when or what kind entry 6 is was changed.',
    ],
    [
      'an entry removed from the middle',
      'DELETE FROM audit_entry WHERE chain = ? AND seq = 5',
      6,
      'Entry 5 is missing: entry 6 comes after 4.',
    ],
    [
      'the first entry removed',
      'DELETE FROM audit_entry WHERE chain = ? AND seq = 1',
      2,
      'Entry 1 is missing: entry 2 comes after 0.',
    ],
    [
      'the last entries cut off',
      'DELETE FROM audit_entry WHERE chain = ? AND seq > 6',
      7,
      'The log ends at entry 6, but its head says 8.',
    ],
    [
      'the link to the entry before',
      "UPDATE audit_entry SET prev_hash = UNHEX(REPEAT('ab', 32)) WHERE chain = ? AND seq = 3",
      3,
      'Entry 3 does not follow from the entry before it.',
    ],
    ['the head set back', 'UPDATE audit_head SET seq = 6 WHERE chain = ?', 7, 'The log ends at entry 6'],
    ['the head removed', 'DELETE FROM audit_head WHERE chain = ?', 9, 'The log ends at entry 8'],
  ];

  it.each(faults)('is found at its entry: %s', async (_what, sql, seq, sentence) => {
    await tamper(sql);

    const broken = await brokenAt();

    expect(broken?.sentence).toContain(sentence);
    expect(broken?.seq).toBe(seq);
  });

  it('is found when an entry was rewritten with hashes that fit', async () => {
    const [rows] = await app.fresh.admin.query<RowDataPacket[]>(
      'SELECT chain, seq, CAST(at AS CHAR) AS at, actor_id, kind, payload, prev_hash FROM audit_entry WHERE chain = ? AND seq = 5',
      [studyId],
    );
    const row = rows[0];
    if (!row) throw new Error('There is no entry 5.');
    await app.fresh.admin.query(
      'UPDATE audit_entry SET payload = "{}", payload_hash = UNHEX(SHA2("{}", 256)) WHERE chain = ? AND seq = 5',
      [studyId],
    );
    const [fresh] = await app.fresh.admin.query<RowDataPacket[]>(
      'SELECT payload_hash FROM audit_entry WHERE chain = ? AND seq = 5',
      [studyId],
    );
    const hash = entryHash({
      chain: row.chain,
      seq: row.seq,
      at: row.at,
      actorId: row.actor_id,
      kind: row.kind,
      payloadHash: fresh[0]?.payload_hash,
      prevHash: row.prev_hash,
    });
    await app.fresh.admin.query('UPDATE audit_entry SET hash = ? WHERE chain = ? AND seq = 5', [hash, studyId]);

    expect(await brokenAt()).toEqual({ seq: 6, sentence: 'Entry 6 does not follow from the entry before it.' });
  });
});

it('reports a broken log to the auditor and writes that down', async () => {
  await append(edited('Edit 4'));
  await app.fresh.admin.query('DROP TRIGGER audit_entry_keep');
  await app.fresh.admin.query(
    "UPDATE audit_entry SET payload = REPLACE(payload, 'Edit 4', 'Edit 5') WHERE chain = ? AND seq = 4",
    [studyId],
  );

  const reply = await verify();

  expect(reply.body).toMatchObject({
    whole: false,
    broken: { seq: 4, sentence: 'What entry 4 says is not what was written.' },
  });
  expect((await list()).entries[0]?.event).toMatchObject({ event: 'log.verified', whole: false });
});
