import { and, eq } from 'drizzle-orm';
import { ruleOnAssumption } from '../../../shared/api/submissions.ts';
import { canRule } from '../../../shared/domain/submission-policy.ts';
import { Problem, requireAllowed } from '../../db/problem.ts';
import { rulings } from '../../db/schema/submissions.ts';
import { describeSubmission, factsOf, lockSubmission } from '../../db/submission-reads.ts';
import { defineCommand } from '../../http/handler.ts';

export const ruleOnAssumptionCommand = defineCommand(
  ruleOnAssumption,
  async ({ actor, params, body, tx, services }) => {
    const { study, row } = await lockSubmission(tx, actor, params.submissionId);
    const submission = await describeSubmission(tx, row);
    requireAllowed(canRule(actor, factsOf(submission)));
    const { routeId, assumptionKey, ruling } = body;
    const assumption = submission.snapshot.routeIds.includes(routeId)
      ? submission.snapshot.evaluation.routes[routeId]?.assumptions.find((one) => one.key === assumptionKey)
      : undefined;
    if (!assumption) throw new Problem('not found', 'There is no such assumption in this package.');
    const refused = (field: string, sentence: string) =>
      new Problem('invalid', sentence, { fields: { [field]: sentence } });
    if (ruling.ruling === 'accepted on condition' && !ruling.condition) {
      throw refused('body.ruling.condition', 'Say what the condition is and when it is due.');
    }
    if (ruling.ruling !== 'accepted on condition' && ruling.condition) {
      throw refused('body.ruling.condition', 'Only "accepted on condition" has a condition.');
    }
    if (ruling.ruling === 'refused' && ruling.comment === '') {
      throw refused('body.ruling.comment', 'Say why you refuse it.');
    }

    const same = and(
      eq(rulings.submissionId, row.id),
      eq(rulings.routeId, routeId),
      eq(rulings.assumptionKey, assumptionKey),
    );
    const [before] = await tx.select({ ruling: rulings.ruling }).from(rulings).where(same);
    const values = {
      submissionId: row.id,
      routeId,
      assumptionKey,
      ruling,
      byPerson: actor.personId,
      at: services.now(),
    };
    if (before) await tx.update(rulings).set(values).where(same);
    else await tx.insert(rulings).values(values);
    return {
      reply: await describeSubmission(tx, row),
      audit: [
        {
          chain: study.id,
          event: {
            event: 'assumption.ruled',
            submissionId: row.id,
            routeId,
            assumptionKey,
            statement: assumption.statement,
            before: before?.ruling ?? null,
            after: ruling,
          },
        },
      ],
      notices: [],
    };
  },
);
