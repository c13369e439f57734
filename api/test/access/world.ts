import type { Role } from '../../src/access/permissions.js';
import { addProposal } from '../../src/modules/payments/payments.testkit.js';
import { addLink, linkCookie } from '../../src/modules/share/share.testkit.js';
import type { Agent, TestApp } from '../harness.js';
import { addCompany, addPerson, type TestPerson } from '../people.js';

/** Stands in the names of our company's things; nobody else may ever see it. */
export const MARK = 'Marked-as-ours';

/** A card service that nobody ever reaches; its words are signed with this secret. */
export const walkCardService = {
  STRIPE_SECRET_KEY: 'sk_test_of_the_walk',
  STRIPE_WEBHOOK_SECRET: 'whsec_of_the_walk',
  STRIPE_API_BASE: 'http://127.0.0.1:9',
};

export const PASSWORD = 'the password of everyone here';

/** A company of ours with a person of each role, another company, and somebody who belongs to none. */
export interface World {
  readonly test: TestApp;
  readonly companyId: string;
  readonly companyName: string;
  readonly members: Readonly<Record<Role, TestPerson>>;
  readonly otherOwner: TestPerson;
  /** Somebody else of that other company. */
  other(role: Role): Promise<TestPerson>;
  readonly nobody: TestPerson;
  /** The owner of our company, to make things with. */
  readonly owner: Agent;
  email(person: TestPerson): Promise<string>;
}

/** @param passwordHash of PASSWORD: made once, since it is costly on purpose */
export async function makeWorld(test: TestApp, passwordHash: string): Promise<World> {
  const person = async (company: string, role: Role) => {
    const made = await addPerson(test, company, role);
    await test.database.executeSql('UPDATE users SET password_hash = $1 WHERE id = $2', [
      passwordHash,
      made.actor.userId,
    ]);
    return made;
  };
  const companyName = `${MARK} company`;
  const companyId = await addCompany(test, companyName);
  const members = {
    owner: await person(companyId, 'owner'),
    designer: await person(companyId, 'designer'),
    crew: await person(companyId, 'crew'),
  };
  const otherOwner = await person(await addCompany(test, 'Another company'), 'owner');
  const gone = await addCompany(test, 'Gone');
  const nobody = await person(gone, 'owner');
  await test.database.executeSql('DELETE FROM companies WHERE id = $1', [gone]);
  return {
    test,
    companyId,
    companyName,
    members,
    otherOwner,
    other: async (role) => (role === 'owner' ? otherOwner : person(otherOwner.actor.companyId, role)),
    nobody,
    owner: members.owner.agent,
    async email({ actor }) {
      const { rows } = await test.database.executeSql('SELECT email FROM users WHERE id = $1', [
        actor.userId,
      ]);
      return (rows[0] as { email: string }).email;
    },
  };
}

/** Somebody without an account who holds a live link to another proposal of ours. */
export async function otherGuest({ test, companyId }: World): Promise<{ agent: Agent; cookie: string }> {
  const { linkId } = await addLink(test, await addProposal(test, companyId, `${MARK} other job`));
  return guestOf(test, linkId);
}

/** Somebody who holds the cookie of a link, and sends it to whatever address. */
export function guestOf(test: TestApp, linkId: string): { agent: Agent; cookie: string } {
  const cookie = linkCookie(test, linkId);
  const agent = test.agent();
  agent.set('Cookie', cookie);
  return { agent, cookie };
}
