import { chiltonColburn } from './analogies/chilton-colburn.ts';
import { colburnFriction } from './analogies/colburn-friction.ts';
import { churchillBernstein } from './external-flow/churchill-bernstein.ts';
import { froessling } from './external-flow/froessling.ts';
import { ranzMarshall } from './external-flow/ranz-marshall.ts';
import { blasius } from './friction/blasius.ts';
import { filonenko } from './friction/filonenko.ts';
import type { Method } from './method.ts';
import { wakaoFunazkri } from './packed-bed/wakao-funazkri.ts';
import { wakaoKaguei } from './packed-bed/wakao-kaguei.ts';
import { bergerHau } from './pipe/berger-hau.ts';
import { colburn } from './pipe/colburn.ts';
import { dittusBoelterCooling } from './pipe/dittus-boelter-cooling.ts';
import { dittusBoelterHeating } from './pipe/dittus-boelter-heating.ts';
import { gillilandSherwood } from './pipe/gilliland-sherwood.ts';
import { gnielinski } from './pipe/gnielinski.ts';
import { levequeMass } from './pipe/leveque-mass.ts';
import { lintonSherwood } from './pipe/linton-sherwood.ts';
import { petukhov } from './pipe/petukhov.ts';
import { siederTateTurbulent } from './pipe/sieder-tate-turbulent.ts';
import { eisenberg } from './rotating/eisenberg.ts';

/** Every method of the library, in the order in which a picker lists them. */
export const methods: readonly Method[] = [
  dittusBoelterHeating,
  dittusBoelterCooling,
  colburn,
  siederTateTurbulent,
  petukhov,
  gnielinski,
  levequeMass,
  gillilandSherwood,
  lintonSherwood,
  bergerHau,
  filonenko,
  blasius,
  colburnFriction,
  churchillBernstein,
  ranzMarshall,
  froessling,
  wakaoFunazkri,
  wakaoKaguei,
  eisenberg,
  chiltonColburn,
];

const byId = new Map(methods.map((method) => [method.id, method]));

export function findMethod(id: string): Method | undefined {
  return byId.get(id);
}
