import type { Finding } from '../model/evaluation.ts';
import { formatNumber } from '../quantity/format-measured.ts';
import { symbolOf } from './operating-point-readings.ts';
import type { StudyWorkings } from './study-workings.ts';

/** Quantities without a value of their own making: no route, or several and none adopted. */
export function quantityFindings(study: StudyWorkings): Finding[] {
  return study.model.quantities.flatMap((quantity): Finding[] => {
    if (study.routeInForce(quantity.id)) return [];
    const subject = { kind: 'quantity', id: quantity.id } as const;
    const count = study.routesOf(quantity.id).length;
    return [
      count === 0
        ? { code: 'no-route', severity: 'stops', subject, sentence: `“${quantity.name}” has no route yet. Add one.` }
        : {
            code: 'none-adopted',
            severity: 'stops',
            subject,
            sentence: `“${quantity.name}” has ${count} routes and none is adopted. Adopt the one its value shall come from.`,
          },
    ];
  });
}

/** Two ways to the same group may differ by this much before it is worth a word. */
const noticeableDifference = 0.05;

/** Groups that were entered although they also follow from other entries, and differ from what follows. */
export function pointFindings(study: StudyWorkings): Finding[] {
  return study.model.operatingPoints.flatMap((point) =>
    ['nu', 'mu', 'Re', 'Pr', 'Sc'].flatMap((key): Finding[] => {
      const entered = study.points.read(point.id, key);
      const computed = study.points.computedBesideEntered(point.id, key);
      if (!entered.ok || !computed) return [];
      const apart = Math.abs(entered.term.value / computed.term.value - 1);
      if (!(apart > noticeableDifference)) return [];
      const sentence =
        `${symbolOf(key)} of “${point.name}” is entered as ${formatNumber(entered.term.value)}, but ${computed.origin} gives ` +
        `${formatNumber(computed.term.value)}. The entered value is used.`;
      return [
        { code: 'group-disagrees', severity: 'warns', subject: { kind: 'operating-point', id: point.id }, sentence },
      ];
    }),
  );
}

/** Tests that give no result, and test results used away from where they were measured. */
export function testFindings(study: StudyWorkings): Finding[] {
  const withoutResult = study.model.tests.flatMap((test): Finding[] => {
    const coefficient = study.test(test.id)?.heatTransferCoefficient;
    if (!coefficient || coefficient.ok) return [];
    return coefficient.reasons.map((sentence) => ({
      code: 'test-without-result',
      severity: 'stops',
      subject: { kind: 'test', id: test.id },
      sentence,
    }));
  });
  const elsewhere = study.model.routes.flatMap((route): Finding[] => {
    if (route.kind !== 'test-result') return [];
    const test = study.model.tests.find((one) => one.id === route.testId);
    const quantity = study.quantity(route.quantityId);
    if (!test || !quantity || test.operatingPointId === quantity.operatingPointId) return [];
    const sentence =
      `“${test.name}” was run at ${study.points.nameOf(test.operatingPointId)}, but “${quantity.name}” stands at ` +
      `${study.points.nameOf(quantity.operatingPointId)}.`;
    return [{ code: 'test-elsewhere', severity: 'warns', subject: { kind: 'route', id: route.id }, sentence }];
  });
  return [...withoutResult, ...elsewhere];
}
