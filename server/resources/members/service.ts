import { Op, type Transaction } from 'sequelize';
import type { z } from 'zod';
import type { Member, memberRequest, memberUpdate, NewMember } from '../../../shared/contracts/api';
import type { Context } from '../../context';
import type { Actor, Membership } from '../../http/actor';
import { Refusal } from '../../http/errors';
import { personKeyOf } from '../../http/membership';
import { hashOf, newToken } from '../../http/tokens';
import { validId } from '../../http/validate';
import type { UserModel } from '../../models/accounts';
import type { InvitationModel, MemberModel } from '../../models/productions';
import { normalEmail } from '../account/service';
import { lockProduction } from '../changes/service';

const INVITED_FOR = 30 * 24 * 60 * 60 * 1000;
const PERSON = { association: 'person', attributes: ['key'] };

function presentMember(member: MemberModel, actor: Actor): Member {
  const user = member.get('user') as UserModel;
  return {
    id: member.id,
    name: user.name,
    email: user.email,
    role: member.role,
    person: personKeyOf(member),
    invited: false,
    self: member.userId === actor.userId,
  };
}

const presentInvitation = (invitation: InvitationModel): Member => ({
  id: invitation.id,
  name: null,
  email: invitation.email,
  role: invitation.role,
  person: personKeyOf(invitation),
  invited: true,
  self: false,
});

/** Members in the order in which they came, then those who are invited. */
export async function listMembers({ db, now }: Context, { productionId }: Membership, actor: Actor): Promise<Member[]> {
  const members = await db.members.findAll({
    where: { productionId },
    include: [{ association: 'user' }, PERSON],
    order: [
      ['createdAt', 'ASC'],
      ['id', 'ASC'],
    ],
  });
  const invitations = await db.invitations.findAll({
    where: { productionId, acceptedAt: null, expiresAt: { [Op.gt]: now() } },
    include: [PERSON],
    order: [['createdAt', 'ASC']],
  });
  return [...members.map((member) => presentMember(member, actor)), ...invitations.map(presentInvitation)];
}

async function personIdOf({ db }: Context, productionId: string, key: string | null | undefined, transaction: Transaction) {
  if (key === undefined || key === null) return null;
  const person = await db.rows.people.findOne({ where: { productionId, key, removedAt: null }, attributes: ['id'], transaction });
  if (person) return String(person.get('id'));
  throw new Refusal('wrong-fields', 'There is no such person in this production. Choose one of its people, or none.', [
    { path: 'person', expected: 'the id of a person of this production' },
  ]);
}

/** Adds whoever has an account with that e-mail; anybody else gets an invitation, whose address is told once. */
export async function addMember(
  context: Context,
  actor: Actor,
  { productionId }: Membership,
  asked: z.infer<typeof memberRequest>,
): Promise<NewMember> {
  const { db } = context;
  const email = normalEmail(asked.email);
  return db.sequelize.transaction(async (transaction) => {
    await lockProduction(context, productionId, transaction);
    const personId = await personIdOf(context, productionId, asked.person, transaction);
    const user = await db.users.findOne({ where: { email }, transaction });
    if (!user) return invite(context, actor, { productionId, email, role: asked.role, personId }, transaction);
    if (await db.members.findOne({ where: { productionId, userId: user.id }, transaction }))
      throw new Refusal('conflict', 'They are a member already. Change their role in the list.');
    const { id } = await db.members.create({ productionId, userId: user.id, role: asked.role, personId }, { transaction });
    const member = await db.members.findByPk(id, { include: [{ association: 'user' }, PERSON], transaction, rejectOnEmpty: true });
    return { ...presentMember(member, actor), address: null };
  });
}

async function invite(
  { db, now }: Context,
  actor: Actor,
  whom: Pick<InvitationModel, 'productionId' | 'email' | 'role' | 'personId'>,
  transaction: Transaction,
): Promise<NewMember> {
  const token = newToken();
  const at = now();
  await db.invitations.destroy({ where: { productionId: whom.productionId, email: whom.email }, transaction });
  const { id } = await db.invitations.create(
    {
      ...whom,
      tokenHash: hashOf(token),
      invitedBy: actor.userId,
      createdAt: at,
      expiresAt: new Date(at.getTime() + INVITED_FOR),
      acceptedAt: null,
    },
    { transaction },
  );
  const invitation = await db.invitations.findByPk(id, { include: [PERSON], transaction, rejectOnEmpty: true });
  return { ...presentInvitation(invitation), address: `/invitation/${token}` };
}

/** Takes up an invitation with its token; whoever holds the address is who was meant. */
export async function acceptInvitation(context: Context, actor: Actor, token: string): Promise<{ id: string }> {
  const { db, now } = context;
  return db.sequelize.transaction(async (transaction) => {
    const invitation = await db.invitations.findOne({
      where: { tokenHash: hashOf(token), acceptedAt: null, expiresAt: { [Op.gt]: now() } },
      transaction,
      lock: transaction.LOCK.UPDATE,
    });
    if (!invitation) throw new Refusal('not-found', 'This invitation was used or has run out. Ask the producer for a new one.');
    const { productionId, role, personId } = invitation;
    const known = await db.members.findOne({ where: { productionId, userId: actor.userId }, transaction });
    if (!known) await db.members.create({ productionId, userId: actor.userId, role, personId }, { transaction });
    await invitation.update({ acceptedAt: now() }, { transaction });
    return { id: productionId };
  });
}

/** Somebody of the list: a member, else an invitation. Taken within the lock of the production, so that one producer always stays. */
async function demandMember({ db }: Context, productionId: string, id: string, transaction: Transaction) {
  const member = await db.members.findOne({ where: { productionId, id }, include: [{ association: 'user' }, PERSON], transaction });
  if (member) return { member, invitation: null };
  const invitation = await db.invitations.findOne({ where: { productionId, id, acceptedAt: null }, transaction });
  if (invitation) return { member: null, invitation };
  throw new Refusal('not-found', 'They are no longer in the list. Load the page again.');
}

async function demandAnotherProducer({ db }: Context, member: MemberModel, transaction: Transaction): Promise<void> {
  if (member.role !== 'producer') return;
  const others = await db.members.count({
    where: { productionId: member.productionId, role: 'producer', id: { [Op.ne]: member.id } },
    transaction,
  });
  if (others === 0) throw new Refusal('conflict', 'A production needs a producer. Make somebody else a producer first.');
}

export async function updateMember(
  context: Context,
  actor: Actor,
  { productionId }: Membership,
  id: string | undefined,
  asked: z.infer<typeof memberUpdate>,
): Promise<Member> {
  return context.db.sequelize.transaction(async (transaction) => {
    await lockProduction(context, productionId, transaction);
    const { member } = await demandMember(context, productionId, validId(id), transaction);
    if (!member) throw new Refusal('conflict', 'They have not taken up their invitation. Remove it and invite them anew.');
    if (asked.role !== undefined && asked.role !== 'producer') await demandAnotherProducer(context, member, transaction);
    const personId = asked.person === undefined ? member.personId : await personIdOf(context, productionId, asked.person, transaction);
    await member.update({ role: asked.role ?? member.role, personId }, { transaction });
    await member.reload({ include: [{ association: 'user' }, PERSON], transaction });
    return presentMember(member, actor);
  });
}

/** Takes somebody out; their open pages are refused from then on. */
export async function removeMember(context: Context, { productionId }: Membership, id: string | undefined): Promise<void> {
  await context.db.sequelize.transaction(async (transaction) => {
    await lockProduction(context, productionId, transaction);
    const { member, invitation } = await demandMember(context, productionId, validId(id), transaction);
    if (invitation) await invitation.destroy({ transaction });
    if (!member) return;
    await demandAnotherProducer(context, member, transaction);
    await member.destroy({ transaction });
  });
}
