import type { z } from 'zod';
import type { Link, linkRequest, NewLink } from '../../../shared/contracts/api';
import { may } from '../../../shared/domain/policy';
import type { Context } from '../../context';
import type { Actor, Membership } from '../../http/actor';
import { Refusal } from '../../http/errors';
import { personKeyOf } from '../../http/membership';
import { hashOf, newToken } from '../../http/tokens';
import { validId } from '../../http/validate';
import type { LinkModel } from '../../models/productions';

const PERSON = { association: 'person', attributes: ['key'] };
/** Addresses that are open at a time in one production; far more than a production has people. */
const MOST = 500;

/** Somebody who may not manage all addresses has to do only with those of their own person. */
const isOwn = (member: Membership, person: string | null) =>
  may(member.role, 'manageLinks') || (person !== null && person === member.person);

function present(link: LinkModel): Link {
  return {
    id: link.id,
    kind: link.kind,
    person: personKeyOf(link),
    createdAt: link.createdAt.toISOString(),
    revokedAt: link.revokedAt?.toISOString() ?? null,
    lastUsedAt: link.lastUsedAt?.toISOString() ?? null,
  };
}

/** The private addresses that this member may know of, the newest first. The addresses themselves are not kept. */
export async function listLinks({ db }: Context, member: Membership): Promise<Link[]> {
  const links = await db.links.findAll({
    where: { productionId: member.productionId },
    include: [PERSON],
    order: [
      ['createdAt', 'DESC'],
      ['id', 'ASC'],
    ],
  });
  return links.map(present).filter((link) => isOwn(member, link.person));
}

/**
 * Makes a calendar address of one person. It is told this once: only its hash is kept.
 * @param origin where the server was reached, such as `http://127.0.0.1:3000`.
 */
export async function createLink(
  { db, now }: Context,
  actor: Actor,
  member: Membership,
  asked: z.infer<typeof linkRequest>,
  origin: string,
): Promise<NewLink> {
  const { productionId } = member;
  if (asked.kind !== 'calendar' || asked.person === undefined)
    throw new Refusal('wrong-fields', 'Name the person whose calendar it is: { kind: calendar, person: ID }.');
  if (!isOwn(member, asked.person))
    throw new Refusal('not-allowed', 'You may make a calendar address of your own only. Ask the producer or the engineer.');
  const person = await db.rows.people.findOne({ where: { productionId, key: asked.person, removedAt: null }, attributes: ['id'] });
  if (!person) throw new Refusal('wrong-fields', `There is nobody called ${asked.person} in this production. Choose one of its people.`);
  if ((await db.links.count({ where: { productionId, revokedAt: null } })) >= MOST)
    throw new Refusal('too-many', `This production has ${MOST} open addresses. Withdraw some that nobody uses, then make a new one.`);
  const token = newToken();
  const link = await db.links.create({
    productionId,
    kind: 'calendar',
    personId: String(person.get('id')),
    tokenHash: hashOf(token),
    createdBy: actor.userId,
    createdAt: now(),
    revokedAt: null,
    lastUsedAt: null,
  });
  return { ...present(link), person: asked.person, address: `${origin}/calendar/${token}.ics` };
}

/** Withdraws an address: it answers like one that never was. Doing it twice does no harm. */
export async function revokeLink({ db, now }: Context, member: Membership, id: string | undefined): Promise<void> {
  const link = await db.links.findOne({ where: { productionId: member.productionId, id: validId(id) }, include: [PERSON] });
  if (!link || !isOwn(member, personKeyOf(link))) throw new Refusal('not-found', 'There is no such address in this production.');
  if (link.revokedAt === null) await link.update({ revokedAt: now() });
}
