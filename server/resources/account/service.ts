import bcrypt from 'bcryptjs';
import { UniqueConstraintError, type Transaction } from 'sequelize';
import type { z } from 'zod';
import type { accountRequest, passwordRequest, signInRequest } from '../../../shared/contracts/api';
import type { Context } from '../../context';
import type { Actor } from '../../http/actor';
import { endSessions } from '../../http/authenticate';
import { Refusal } from '../../http/errors';
import type { UserModel } from '../../models/accounts';

/** A hash of nothing anybody knows: comparing with it takes as long as comparing with a real one of that cost. */
const nobodysHash = (cost: number) => `$2b$${String(cost).padStart(2, '0')}$CjwHqBqqBQ3jJ3o0ZyUhVu7dVYd0TzC2rA3aYpXhD1Zx5o4s0mJ2m`;

export const normalEmail = (email: string) => email.trim().toLowerCase();

/** The user whose e-mail and password these are; whether the e-mail is known cannot be told from the answer or its time. */
export async function signedInUser({ db, config }: Context, asked: z.infer<typeof signInRequest>): Promise<UserModel> {
  const user = await db.users.findOne({ where: { email: normalEmail(asked.email) } });
  const matches = await bcrypt.compare(asked.password, user?.passwordHash ?? nobodysHash(config.passwordCost));
  if (!user || !matches)
    throw new Refusal('not-signed-in', 'E-mail and password do not match. Check both; the password is case-sensitive.');
  return user;
}

/** Creates an account. A trial user becomes it and keeps the productions. */
export async function createAccount(context: Context, actor: Actor | null, asked: z.infer<typeof accountRequest>): Promise<UserModel> {
  const { db, config } = context;
  const fields = {
    email: normalEmail(asked.email),
    name: asked.name.trim(),
    passwordHash: await bcrypt.hash(asked.password, config.passwordCost),
  };
  try {
    const trial = actor?.trial ? await db.users.findByPk(actor.userId) : null;
    return trial ? await trial.update(fields) : await db.users.create(fields);
  } catch (error) {
    if (!(error instanceof UniqueConstraintError)) throw error;
    throw new Refusal('conflict', 'There is already an account with this e-mail. Sign in instead.');
  }
}

export async function changePassword(context: Context, actor: Actor, asked: z.infer<typeof passwordRequest>): Promise<void> {
  const { db, config } = context;
  const user = await db.users.findByPk(actor.userId);
  if (!user?.passwordHash) throw new Refusal('conflict', 'A trial has no password. Create an account first.');
  if (!(await bcrypt.compare(asked.current, user.passwordHash)))
    throw new Refusal('not-allowed', 'The current password is not right. Type it again.');
  await user.update({ passwordHash: await bcrypt.hash(asked.next, config.passwordCost) });
  await endSessions(context, actor.userId, { except: actor.sessionId });
}

/** Gives the productions of a trial to the account that was signed in to, so that nothing made in the trial is lost. */
export async function keepTrial({ db }: Context, trial: Actor, userId: string, transaction: Transaction): Promise<void> {
  const theirs = await db.members.findAll({ where: { userId: trial.userId }, transaction });
  const own = new Set((await db.members.findAll({ where: { userId }, transaction })).map((member) => member.productionId));
  for (const member of theirs)
    if (own.has(member.productionId)) await member.destroy({ transaction });
    else await member.update({ userId }, { transaction });
}
