import type { Endpoint, Input, Reply } from '../../../shared/api/endpoint.ts';
import { signIn } from '../../../shared/api/session.ts';
import {
  addMember,
  type ChainEdit,
  createStudy,
  editChain,
  getStudy,
  type Study,
} from '../../../shared/api/studies.ts';
import type { StudyRole } from '../../../shared/domain/ability.ts';
import { callerAt, cookieOf } from '../api-caller.ts';
import { type DemoRole, demoPassword, demoPeople } from './people.ts';

type Given<E extends Endpoint> = Partial<Input<E>> & {
  readonly file?: { readonly name: string; readonly content: string };
};

/** A demo person at work: every call goes through HTTP, and a refusal ends the seeding with its sentence. */
export type Worker = {
  readonly does: <E extends Endpoint>(endpoint: E, input: Given<E>) => Promise<Reply<E>>;
  readonly edits: (studyId: string, summary: string, edits: readonly ChainEdit[], reason?: string) => Promise<void>;
  readonly sees: (studyId: string) => Promise<Study>;
};

export async function signInAs(address: string, role: DemoRole): Promise<Worker> {
  const { email } = demoPeople[role];
  const signedIn = await callerAt(address, '').call(signIn, { body: { email, password: demoPassword } });
  if (signedIn.status !== 200) throw new Error(`${email} could not sign in: ${signedIn.problem.sentence}`);
  const caller = callerAt(address, cookieOf(signedIn.headers));
  const does: Worker['does'] = async (endpoint, input) => {
    const reply = await caller.call(endpoint, input);
    if (reply.status !== 200) {
      throw new Error(`${endpoint.method} ${endpoint.path}: ${JSON.stringify(reply.problem, null, 1)}`);
    }
    return reply.body;
  };
  return {
    does,
    edits: async (studyId, summary, edits, reason = '') => {
      await does(editChain, { params: { studyId }, body: { summary, reason, edits: [...edits] } });
    },
    sees: (studyId) => does(getStudy, { params: { studyId } }),
  };
}

/** A new study of the worker with its members. */
export async function openStudy(
  worker: Worker,
  facts: { readonly title: string; readonly question: string },
  members: readonly { readonly personId: string; readonly role: StudyRole }[],
): Promise<string> {
  const { id } = await worker.does(createStudy, { body: facts });
  for (const member of members) await worker.does(addMember, { params: { studyId: id }, body: member });
  return id;
}
