import { abilityOf } from '../../shared/domain/ability.ts';
import type { Asking } from '../../shared/domain/study-policy.ts';
import { useActor } from './session.ts';

/** Whoever is signed in, with the ability that policies ask. Apart from the session, which signing in loads too. */
export function useAsking(): Asking {
  const actor = useActor();
  return { ...actor, ability: abilityOf(actor) };
}
