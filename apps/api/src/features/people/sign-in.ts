import { ChangePasswordRequest, SignInRequest } from '@foldwell/contracts';
import type { Request } from 'express';

import { readBody } from '../../http/body.js';
import { Refusal } from '../../http/errors.js';
import type { Answer, Context } from '../../http/route.js';
import { beginSession } from '../../http/session.js';
import { countFailure, forgetFailures, refuseWhileWaiting } from '../../http/throttle.js';
import { hashPassword, isRightPassword } from './passwords.js';
import { Person } from './person.entity.js';

/** Most sessions of one person; the oldest ends when another begins. */
const MOST_SESSIONS = 5;

/** E-mail and password; the answer and the work are the same whether the name exists or not. */
export async function signIn(req: Request, { db }: Context): Promise<Answer> {
  const { email, password } = await readBody(req, SignInRequest);
  const [account, address] = [`account ${email.toLowerCase()}`, `address ${req.ip}`];
  await refuseWhileWaiting(db, [account, address]);
  const person = await db
    .getRepository(Person)
    .createQueryBuilder('p')
    .where('lower(p.email) = lower(:email)', { email })
    .getOne();
  const isRight = await isRightPassword(password, person?.passwordHash ?? null);
  if (!isRight || !person || person.disabledAt) {
    const left = await countFailure(db, account, 'account');
    await countFailure(db, address, 'address');
    const tries =
      left === 0
        ? 'This name waits 10 minutes.'
        : `${left} ${left === 1 ? 'try' : 'tries'} left, then this name waits 10 minutes.`;
    throw new Refusal(401, 'sign_in_refused', `E-mail or password is wrong. ${tries}`);
  }
  await forgetFailures(db, account);
  await beginSession(req, person.id);
  await db.query(
    `DELETE FROM session WHERE sess ->> 'personId' = $1 AND sid <> $2 AND sid NOT IN (
    SELECT sid FROM session WHERE sess ->> 'personId' = $1 AND sid <> $2 ORDER BY expire DESC LIMIT ${MOST_SESSIONS - 1})`,
    [person.id, req.sessionID],
  );
  await db.query('UPDATE person SET last_here_at = clock_timestamp() WHERE id = $1', [person.id]);
  await db.query(`INSERT INTO audit (person_id, action) VALUES ($1, 'sign in')`, [person.id]);
  return { status: 204 };
}

/** Everybody changes his own password; every other session of his ends with the old one. */
export async function changePassword(req: Request, { db, person }: Context): Promise<Answer> {
  const { current, password } = await readBody(req, ChangePasswordRequest);
  const account = `password of ${person.id}`;
  await refuseWhileWaiting(db, [account]);
  const own = await db.getRepository(Person).findOneByOrFail({ id: person.id });
  if (!(await isRightPassword(current, own.passwordHash))) {
    await countFailure(db, account, 'account');
    throw new Refusal(409, 'password_wrong', 'Your password now is not the one you typed.');
  }
  const hash = await hashPassword(password, [own.name, own.email]);
  await db.query(
    'UPDATE person SET password_hash = $2, must_change_password = false WHERE id = $1',
    [person.id, hash],
  );
  await endSessionsOf(db, person.id);
  await beginSession(req, person.id);
  await db.query(`INSERT INTO audit (person_id, action) VALUES ($1, 'password changed')`, [
    person.id,
  ]);
  return { status: 204 };
}

/** Ends every session of a person. */
export async function endSessionsOf(db: Context['db'], personId: string): Promise<void> {
  await db.query(`DELETE FROM session WHERE sess ->> 'personId' = $1`, [personId]);
}
