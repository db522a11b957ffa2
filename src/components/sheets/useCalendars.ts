import { computed, ref, shallowRef, type ComputedRef, type Ref } from 'vue';
import type { Link } from '../../../shared/contracts/api';
import { may } from '../../../shared/domain/policy';
import { sentenceOf } from '../../api/http';
import { createLink, listLinks, revokeLink } from '../../api/links';
import { usePage } from '../../stores/page';
import { useProduction } from '../../stores/production';

export interface Calendars {
  busy: Ref<boolean>;
  trouble: Ref<string | undefined>;
  /** Whether this reader may make the calendar of that person. */
  mayManage: (person: string, own: string | null) => boolean;
  linksOf: (person: string) => Link[];
  /** The address that was made last on this page, for that person; it is told only now. */
  addressOf: ComputedRef<(person: string) => string | null>;
  open: () => Promise<void>;
  make: (person: string) => Promise<void>;
  withdraw: (person: string) => Promise<void>;
}

/** Calendar addresses of the open production. */
export function useCalendars(): Calendars {
  const production = useProduction();
  const page = usePage();
  const links = shallowRef<Link[]>([]);
  const made = shallowRef<ReadonlyMap<string, string>>(new Map());
  const busy = ref(false);
  const trouble = ref<string>();

  async function doing(work: (production: string) => Promise<void>): Promise<void> {
    const id = production.id;
    if (!id || busy.value) return;
    busy.value = true;
    trouble.value = undefined;
    try {
      await work(id);
      links.value = await listLinks(id);
    } catch (reason) {
      trouble.value = sentenceOf(reason);
    } finally {
      busy.value = false;
    }
  }

  const remember = (person: string, address: string | null): void => {
    const next = new Map(made.value);
    if (address === null) next.delete(person);
    else next.set(person, address);
    made.value = next;
  };

  return {
    busy,
    trouble,
    mayManage: (person, own) => may(production.role, 'manageLinks') || (may(production.role, 'ownLinks') && person === own),
    linksOf: (person) => links.value.filter((link) => link.kind === 'calendar' && link.person === person),
    addressOf: computed(() => (person) => made.value.get(person) ?? null),
    open: () => doing(async () => undefined),
    make: (person) =>
      doing(async (id) => {
        const link = await createLink(id, { kind: 'calendar', person });
        remember(person, new URL(new URL(link.address).pathname, location.origin).href);
        page.announce('The calendar address is made.');
      }),
    withdraw: (person) =>
      doing(async (id) => {
        for (const link of links.value)
          if (link.person === person && link.kind === 'calendar' && link.revokedAt === null) await revokeLink(id, link.id);
        remember(person, null);
        page.announce('The calendar address is withdrawn.');
      }),
  };
}
