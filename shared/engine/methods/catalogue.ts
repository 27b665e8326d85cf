import { chiltonColburn } from './analogies/chilton-colburn.ts';
import { colburnFriction } from './analogies/colburn-friction.ts';
import { friendMetzner } from './analogies/friend-metzner.ts';
import { prandtlTaylor } from './analogies/prandtl-taylor.ts';
import { vonKarman } from './analogies/von-karman.ts';
import { churchillBernstein } from './external-flow/churchill-bernstein.ts';
import { froessling } from './external-flow/froessling.ts';
import { plateLaminar } from './external-flow/plate-laminar.ts';
import { plateMixed } from './external-flow/plate-mixed.ts';
import { plateTurbulent } from './external-flow/plate-turbulent.ts';
import { ranzMarshall } from './external-flow/ranz-marshall.ts';
import { whitakerSphere } from './external-flow/whitaker-sphere.ts';
import { blasius } from './friction/blasius.ts';
import { churchill } from './friction/churchill.ts';
import { fanningLaminar } from './friction/fanning-laminar.ts';
import { filonenko } from './friction/filonenko.ts';
import { haaland } from './friction/haaland.ts';
import type { Method } from './method.ts';
import { gunn } from './packed-bed/gunn.ts';
import { guptaThodosGas } from './packed-bed/gupta-thodos-gas.ts';
import { wakaoFunazkri } from './packed-bed/wakao-funazkri.ts';
import { wakaoKaguei } from './packed-bed/wakao-kaguei.ts';
import { bergerHau } from './pipe/berger-hau.ts';
import { colburn } from './pipe/colburn.ts';
import { dittusBoelterCooling } from './pipe/dittus-boelter-cooling.ts';
import { dittusBoelterHeating } from './pipe/dittus-boelter-heating.ts';
import { gillilandSherwood } from './pipe/gilliland-sherwood.ts';
import { gnielinski } from './pipe/gnielinski.ts';
import { gnielinskiEntrance } from './pipe/gnielinski-entrance.ts';
import { hausen } from './pipe/hausen.ts';
import { levequeHeat } from './pipe/leveque-heat.ts';
import { levequeMass } from './pipe/leveque-mass.ts';
import { lintonSherwood } from './pipe/linton-sherwood.ts';
import { petukhov } from './pipe/petukhov.ts';
import { siederTateLaminar } from './pipe/sieder-tate-laminar.ts';
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
  plateLaminar,
  plateTurbulent,
  plateMixed,
  whitakerSphere,
  levequeHeat,
  hausen,
  siederTateLaminar,
  gnielinskiEntrance,
  gunn,
  guptaThodosGas,
  fanningLaminar,
  haaland,
  churchill,
  prandtlTaylor,
  vonKarman,
  friendMetzner,
  chiltonColburn,
];

const byId = new Map(methods.map((method) => [method.id, method]));

export function findMethod(id: string): Method | undefined {
  return byId.get(id);
}
