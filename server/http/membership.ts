import type { Context } from '../context';
import type { InvitationModel, LinkModel, MemberModel } from '../models/productions';
import type { Actor, Membership } from './actor';
import { Refusal } from './errors';
import { validId } from './validate';

/** The actor's place in a production. One that is not theirs does not exist for them. */
export async function membershipOf(context: Context, actor: Actor, production: string | undefined): Promise<Membership> {
  const productionId = validId(production);
  const member = await context.db.members.findOne({
    where: { productionId, userId: actor.userId },
    include: [{ association: 'person', attributes: ['key'] }],
  });
  if (!member) throw new Refusal('not-found', 'There is no such production among yours. Go back to the start page.');
  return { memberId: member.id, productionId, role: member.role, person: personKeyOf(member) };
}

/** The key of the person whom a member is or shall be, or whose link it is, read with the association. */
export function personKeyOf(member: MemberModel | InvitationModel | LinkModel): string | null {
  const person = member.get('person') as { get: (name: string) => unknown } | null | undefined;
  const key = person?.get('key');
  return typeof key === 'string' ? key : null;
}
