import { dimensionOfFormula } from '../formula/check-dimensions.ts';
import { parseFormula } from '../formula/parse-formula.ts';
import { findMethod } from '../methods/catalogue.ts';
import type { Finding } from '../model/evaluation.ts';
import { findPointVariable } from '../model/point-variables.ts';
import type {
  Binding,
  MeasuredValue,
  OperatingPoint,
  Quantity,
  Route,
  StudyModel,
  Test,
} from '../model/study-model.ts';
import { type Dimension, describeDimension, parseUnit, sameDimension } from '../quantity/parse-unit.ts';
import { dimensionOfBinding } from './bound-dimensions.ts';
import { findCycle } from './find-cycle.ts';

export type StructuralError = { readonly sentence: string; readonly subject: Finding['subject'] };

/**
 * What makes a study impossible to store: references that lead nowhere, loops, balances that cannot hold, values
 * that cannot be. What is only unfinished is allowed, and `evaluateStudy` says what is missing.
 */
export function checkModel(model: StudyModel): StructuralError[] {
  return [
    ...repeatedIds(model),
    ...model.operatingPoints.flatMap((point) => checkPoint(model, point)),
    ...model.quantities.flatMap((quantity) => checkQuantity(model, quantity)),
    ...model.routes.flatMap((route) => checkRoute(model, route)),
    ...model.tests.flatMap((test) => checkTest(model, test)),
    ...checkLoop(model),
  ];
}

function repeatedIds(model: StudyModel): StructuralError[] {
  const seen = new Set<string>();
  const all = [
    ...model.operatingPoints,
    ...model.quantities,
    ...model.routes,
    ...model.tests,
    ...model.inputCorrelations,
  ];
  return all.flatMap(({ id }) => {
    if (seen.has(id)) return [{ sentence: `The id ${id} is used twice.`, subject: { kind: 'study' as const, id } }];
    seen.add(id);
    return [];
  });
}

function checkPoint(model: StudyModel, point: OperatingPoint): StructuralError[] {
  const subject = { kind: 'operating-point', id: point.id } as const;
  const found: StructuralError[] = [];
  const keys = new Set<string>();
  for (const { key, source } of point.entries) {
    const variable = findPointVariable(key);
    if (keys.has(key)) found.push({ subject, sentence: `${key} is entered twice at “${point.name}”.` });
    keys.add(key);
    if (source.from === 'test') {
      if (key !== 'u') {
        found.push({
          subject,
          sentence: `${key} of “${point.name}” cannot come from a test; only the velocity u can.`,
        });
      }
      if (!model.tests.some((test) => test.id === source.testId)) {
        found.push({ subject, sentence: `${key} of “${point.name}” comes from a test that is not in the study.` });
      }
      continue;
    }
    const { value } = source.value;
    if (variable?.positive && value <= 0) {
      const reason =
        key === 'T' ? 'a temperature lies above absolute zero (0 K, −273.15 °C)' : `the ${variable.name} is above zero`;
      found.push({ subject, sentence: `${key} of “${point.name}” is ${said(source.value)}: ${reason}.` });
    }
  }
  return found;
}

function checkQuantity(model: StudyModel, quantity: Quantity): StructuralError[] {
  const subject = { kind: 'quantity', id: quantity.id } as const;
  const found: StructuralError[] = [];
  if (!model.operatingPoints.some((point) => point.id === quantity.operatingPointId)) {
    found.push({ subject, sentence: `“${quantity.name}” stands at an operating point that is not in the study.` });
  }
  const unit = parseUnit(quantity.unit);
  if (!unit.ok) {
    found.push({ subject, sentence: `The unit of “${quantity.name}” cannot be read: ${unit.reason}` });
  }
  if (quantity.adoptedRouteId !== null) {
    const adopted = model.routes.find((route) => route.id === quantity.adoptedRouteId);
    if (!adopted) {
      found.push({ subject, sentence: `The route adopted for “${quantity.name}” is not in the study.` });
    } else if (adopted.quantityId !== quantity.id) {
      found.push({
        subject,
        sentence: `“${quantity.name}” cannot adopt the route “${adopted.name}”, which leads to another quantity.`,
      });
    }
  }
  return found;
}

function checkRoute(model: StudyModel, route: Route): StructuralError[] {
  const subject = { kind: 'route', id: route.id } as const;
  const found: StructuralError[] = [];
  const say = (sentence: string) => found.push({ subject, sentence });
  const quantity = model.quantities.find((one) => one.id === route.quantityId);
  if (!quantity) say(`The route “${route.name}” leads to a quantity that is not in the study.`);

  if (route.kind === 'stated-value') {
    const sentence = belowAbsoluteZero(route.value);
    if (sentence) say(`The value of “${route.name}” is ${sentence}.`);
  }
  if (route.kind === 'test-result' && route.testId && !model.tests.some((test) => test.id === route.testId)) {
    say(`The route “${route.name}” names a test that is not in the study.`);
  }
  if (route.kind === 'heat-analogue' && route.sourceQuantityId) {
    if (!model.quantities.some((one) => one.id === route.sourceQuantityId)) {
      say(`The route “${route.name}” starts from a quantity that is not in the study.`);
    }
  }
  if (route.kind === 'correlation' && route.methodId !== '' && !findMethod(route.methodId)) {
    say(`The route “${route.name}” uses the method “${route.methodId}”, which the library does not hold.`);
  }
  if (route.kind === 'correlation' || route.kind === 'balance') {
    for (const [variable, binding] of Object.entries(route.bindings)) {
      if (binding && !leadsSomewhere(model, binding)) {
        say(`${variable} in “${route.name}” takes its value from something that is not in the study.`);
      }
    }
  }
  if (route.kind === 'balance' && route.expression !== '') {
    const sentence = balanceError(model, route, quantity);
    if (sentence) say(sentence);
  }
  return found;
}

function leadsSomewhere(model: StudyModel, binding: Binding): boolean {
  return binding.from === 'quantity'
    ? model.quantities.some((one) => one.id === binding.quantityId)
    : model.operatingPoints.some((one) => one.id === binding.operatingPointId);
}

/**
 * Why a balance cannot hold: it cannot be read, or, once every variable is bound, its dimensions do not fit each
 * other or the unit of the quantity. Null where nothing speaks against it.
 */
export function balanceError(
  model: StudyModel,
  route: Extract<Route, { kind: 'balance' }>,
  quantity: Quantity | undefined,
): string | null {
  const parsed = parseFormula(route.expression);
  if (!parsed.ok) return `The balance “${route.expression}” cannot be read: ${parsed.reason}`;
  const dimensions: Record<string, Dimension> = {};
  for (const variable of parsed.formula.variables) {
    const binding = Object.hasOwn(route.bindings, variable) ? route.bindings[variable] : null;
    const dimension = binding ? dimensionOfBinding(model, binding) : null;
    if (!dimension) return null;
    dimensions[variable] = dimension;
  }
  const result = dimensionOfFormula(route.expression, dimensions);
  if (!result.ok) return `The balance “${route.expression}” is not homogeneous: ${result.reason}`;
  const unit = quantity ? parseUnit(quantity.unit) : null;
  if (quantity && unit?.ok && !sameDimension(result.dimension, unit.unit.dimension)) {
    return (
      `The balance “${route.expression}” gives ${describeDimension(result.dimension)}, ` +
      `but “${quantity.name}” is in ${quantity.unit || '1'} (${describeDimension(unit.unit.dimension)}).`
    );
  }
  return null;
}

function checkTest(model: StudyModel, test: Test): StructuralError[] {
  const subject = { kind: 'test', id: test.id } as const;
  const found: StructuralError[] = [];
  const say = (sentence: string) => found.push({ subject, sentence });
  if (!model.operatingPoints.some((point) => point.id === test.operatingPointId)) {
    say(`The test “${test.name}” was run at an operating point that is not in the study.`);
  }
  const { surface, summary } = test.reduction;
  const size = surface.shape === 'cylinder' ? surface.length : surface.area;
  if (size.value <= 0) {
    const what = surface.shape === 'cylinder' ? 'heated length' : 'heated area';
    say(`The ${what} of “${test.name}” is ${said(size)}: it is above zero.`);
  }
  const [, wall, bulk] = summary.means;
  if (wall <= 0 || bulk <= 0) {
    say(`A mean temperature of “${test.name}” lies below absolute zero: check the unit of its column.`);
  }
  return found;
}

function checkLoop(model: StudyModel): StructuralError[] {
  const loop = findCycle(model);
  if (!loop) return [];
  const [first = ''] = loop;
  const path = [...loop, first].map((name) => `“${name}”`).join(' → ');
  return [
    {
      subject: { kind: 'study', id: 'study' },
      sentence: `These quantities would rest on each other in a loop: ${path}. Remove one of the links.`,
    },
  ];
}

/** A stated temperature in °C or °F that is below absolute zero; null where it is not. */
function belowAbsoluteZero(value: MeasuredValue): string | null {
  const unit = parseUnit(value.unit);
  return unit.ok && unit.unit.offset !== 0 && value.value < 0 ? `${said(value)}, below absolute zero` : null;
}

function said(value: MeasuredValue): string {
  return value.text === '' ? String(value.value) : value.text;
}
