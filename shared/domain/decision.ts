/** The answer of a policy: yes, or no with a sentence for the person who asked. */
export type Decision = { readonly allowed: true } | { readonly allowed: false; readonly reason: string };

export const allowed: Decision = { allowed: true };

export function denied(reason: string): Decision {
  return { allowed: false, reason };
}
