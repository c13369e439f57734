import type { Role } from '../../src/access/permissions.js';
import type { Agent, TestApp } from '../harness.js';
import { addCompany, addPerson, type TestPerson } from '../people.js';

/** Stands in the names of our company's things; nobody else may ever see it. */
export const MARK = 'Marked-as-ours';

export const PASSWORD = 'the password of everyone here';

/** A company of ours with a person of each role, another company, and somebody who belongs to none. */
export interface World {
  readonly test: TestApp;
  readonly companyId: string;
  readonly companyName: string;
  readonly members: Readonly<Record<Role, TestPerson>>;
  readonly otherOwner: TestPerson;
  readonly nobody: TestPerson;
  /** The owner of our company, to make things with. */
  readonly owner: Agent;
  email(person: TestPerson): Promise<string>;
}

/** @param passwordHash of PASSWORD: made once, since it is costly on purpose */
export async function makeWorld(test: TestApp, passwordHash: string): Promise<World> {
  const companyName = `${MARK} company`;
  const companyId = await addCompany(test, companyName);
  const owner = await addPerson(test, companyId, 'owner');
  const members = {
    owner,
    designer: await addPerson(test, companyId, 'designer'),
    crew: await addPerson(test, companyId, 'crew'),
  };
  const otherOwner = await addPerson(test, await addCompany(test, 'Another company'), 'owner');
  const gone = await addCompany(test, 'Gone');
  const nobody = await addPerson(test, gone, 'owner');
  await test.database.executeSql('DELETE FROM companies WHERE id = $1', [gone]);
  const people = [...Object.values(members), otherOwner, nobody].map(({ actor }) => actor.userId);
  await test.database.executeSql('UPDATE users SET password_hash = $1 WHERE id = ANY ($2)', [
    passwordHash,
    people,
  ]);
  return {
    test,
    companyId,
    companyName,
    members,
    otherOwner,
    nobody,
    owner: owner.agent,
    async email({ actor }) {
      const { rows } = await test.database.executeSql('SELECT email FROM users WHERE id = $1', [
        actor.userId,
      ]);
      return (rows[0] as { email: string }).email;
    },
  };
}

/** A fresh agent, of a caller without a session. */
export const signedOut = (world: World): Agent => world.test.agent();
