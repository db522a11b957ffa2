import type { Reader } from '../../shared/domain/policy';

/** Who asks: a user with a session that PostgreSQL knows. */
export interface Actor {
  userId: string;
  sessionId: string;
  name: string;
  email: string | null;
  trial: boolean;
}

/** An actor's place in one production. */
export interface Membership extends Reader {
  memberId: string;
  productionId: string;
}
