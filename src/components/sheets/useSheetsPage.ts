import { useNow } from '@vueuse/core';
import { computed, ref, shallowRef, watch, type ComputedRef, type Ref, type ShallowRef } from 'vue';
import type { SheetsPlan } from '../../../shared/contracts/sheets';
import { type Paper, wallAt } from '../../../shared/domain/sheets/sheet';
import { dayWords } from '../../../shared/time/words';
import { Refusal, sentenceOf } from '../../api/http';
import { fetchPdf, readSheetsPlan } from '../../api/sheets';
import { usePage } from '../../stores/page';
import { useProduction } from '../../stores/production';
import { documentOf, type SheetDocument, type SheetEntry, sheetEntries } from './entries';

export interface SheetsPage {
  plan: ShallowRef<SheetsPlan | null>;
  /** Nothing can be printed yet. */
  nothing: Ref<boolean>;
  error: Ref<string | undefined>;
  trouble: Ref<string | undefined>;
  groups: ComputedRef<{ title: string; entries: SheetEntry[] }[]>;
  choices: ComputedRef<{ value: string; label: string }[]>;
  /** The plan chosen, as a sheet's address names it. */
  named: Ref<string>;
  subtitle: ComputedRef<string>;
  entry: ComputedRef<SheetEntry | null>;
  shown: ComputedRef<SheetDocument | null>;
  paper: Ref<Paper>;
  printing: Ref<boolean>;
  open: (named?: string) => Promise<void>;
  show: (id: string) => void;
  download: (id: string) => Promise<void>;
}

function save(name: string, content: Blob): void {
  const address = URL.createObjectURL(content);
  const link = document.createElement('a');
  link.href = address;
  link.download = name;
  link.click();
  // The browser needs the address until it has begun to read it.
  setTimeout(() => URL.revokeObjectURL(address), 60_000);
}

/** What the page of sheets shows, and what is done on it. */
export function useSheetsPage(): SheetsPage {
  const production = useProduction();
  const page = usePage();
  const plan = shallowRef<SheetsPlan | null>(null);
  const nothing = ref(false);
  const error = ref<string>();
  const trouble = ref<string>();
  const selected = ref<string | null>(null);
  const paper = ref<Paper>('A4');
  const printing = ref(false);
  const named = ref('');
  const now = useNow({ interval: 60_000 });

  const entries = computed(() => (plan.value ? sheetEntries(plan.value, production.role) : { runs: [], calls: [] }));
  const groups = computed(() =>
    [
      { title: 'Run sheets', entries: entries.value.runs },
      { title: 'Call sheets', entries: entries.value.calls },
    ].filter((group) => group.entries.length > 0),
  );
  const all = computed(() => groups.value.flatMap((group) => group.entries));
  const entry = computed(() => all.value.find(({ id }) => id === selected.value) ?? all.value[0] ?? null);
  const shown = computed(() => {
    if (!plan.value || !entry.value) return null;
    const printed = wallAt(now.value.getTime(), plan.value.file.production.timezone);
    return documentOf(plan.value, entry.value.subject, paper.value, printed);
  });
  const choices = computed(() =>
    (plan.value?.choices ?? []).map(({ named: value, version, at }) => ({
      value,
      label: `${version === null ? 'draft' : `version ${version}`}, ${dayWords(wallAt(Date.parse(at), plan.value?.file.production.timezone ?? 'UTC').slice(0, 10))}`,
    })),
  );
  const subtitle = computed(() => {
    if (!plan.value) return '';
    const { version } = plan.value.shown;
    return version === null ? 'a draft: nobody was told of it yet' : `version ${version}, as published`;
  });

  async function open(wanted?: string): Promise<void> {
    const id = production.id;
    if (!id) return;
    error.value = undefined;
    try {
      const read = await readSheetsPlan(id, wanted);
      if (production.id !== id) return;
      if (plan.value === null) paper.value = read.file.production.paper ?? 'A4';
      plan.value = read;
      nothing.value = false;
      named.value = read.shown.named;
    } catch (reason) {
      nothing.value = plan.value === null && reason instanceof Refusal && reason.status === 404;
      if (plan.value === null && !nothing.value) error.value = sentenceOf(reason);
      else if (plan.value !== null) trouble.value = sentenceOf(reason);
    }
  }
  watch(named, (wanted) => {
    if (plan.value && wanted !== plan.value.shown.named) void open(wanted);
  });

  function show(id: string): void {
    selected.value = id;
    const label = all.value.find((one) => one.id === id)?.label;
    if (label) page.announce(`Showing ${label}.`);
  }

  async function download(id: string): Promise<void> {
    const wanted = all.value.find((one) => one.id === id);
    if (!wanted || !plan.value || !production.id || printing.value) return;
    trouble.value = undefined;
    printing.value = true;
    page.announce(`Making the PDF of ${wanted.label}.`);
    try {
      const { name, content } = await fetchPdf(production.id, plan.value.shown.named, wanted.subject, paper.value);
      save(name, content);
      page.announce(`${name} is downloaded.`);
    } catch (reason) {
      trouble.value = sentenceOf(reason);
    } finally {
      printing.value = false;
    }
  }

  return { plan, nothing, error, trouble, groups, choices, named, subtitle, entry, shown, paper, printing, open, show, download };
}
