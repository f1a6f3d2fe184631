import { type ComputedRef, computed, reactive, ref } from 'vue';
import type { PlugPage, Rack } from '@shared/contracts/stock.ts';
import { LOSS_SEEN, type LossCause, type LossSeen } from '@shared/domain/losses.ts';
import { formatPlugCode } from '@shared/domain/plug-code.ts';
import { explainProblem, readScan } from '@shared/domain/scan-text.ts';
import { newKey } from '@/api/new-key.ts';
import type { ScanSignal } from '@/composables/useScanSignal.ts';
import { useScanActs } from '@/queries/scan.ts';
import { useUnitChoicesStore } from '@/stores/unit-choices.ts';
import type { ScanAct } from '@/views/scan/scan-entries.ts';
import { useScanEntries } from '@/views/scan/useScanEntries.ts';
import { PLUG_STATES } from '@/views/stock/stock-words.ts';

/** What the acts need beside a plug; chosen once for a whole run of scans. */
export interface ScanChoices {
  act: ScanAct;
  rackId: string | null;
  startPosition: string | null;
  seen: LossSeen | null;
  cause: LossCause;
}

/** A run of scans: an act chosen first and many scans, or one scan first and then its act. */
export function useScanRun(racks: ComputedRef<readonly Rack[]>, signal: (kind: ScanSignal) => void) {
  const acts = useScanActs();
  const units = useUnitChoicesStore();
  const list = useScanEntries((went) => {
    signal(went ? 'done' : 'refused');
  });
  const choices = reactive<ScanChoices>({
    act: 'look',
    rackId: null,
    startPosition: null,
    seen: null,
    cause: 'unknown',
  });
  const foundPlug = ref<PlugPage | null>(null);
  const foundRack = ref<Rack | null>(null);
  /** A plug that was scanned before its act had all it needs. */
  const waiting = ref<string | null>(null);
  const notice = ref('');
  const rack = computed(() => racks.value.find(({ id }) => id === choices.rackId) ?? null);

  async function take(text: string): Promise<void> {
    notice.value = '';
    const reading = readScan(text, (code) => racks.value.some((each) => each.code === code));
    if (reading.kind === 'rack') await takeRack(reading.code);
    else if (reading.kind === 'plug') await takePlug(reading.code);
    else if (reading.kind !== 'unknown') await tellPlace(reading.kind, reading.code);
    else list.refuse(reading.text.slice(0, 40) || 'No code', explainProblem(reading.problem), reading.suggestion);
  }

  async function takeRack(code: string): Promise<void> {
    const known = racks.value.find((each) => each.code === code);
    if (!known) {
      list.refuse(code, 'No rack of the farm has this code.');
      return;
    }
    signal('done');
    if (choices.act !== 'move') {
      foundRack.value = known;
      foundPlug.value = null;
      return;
    }
    moveTo(known);
    if (waiting.value !== null) await actOn(waiting.value);
  }

  /** Nothing is done with a tank or a box here: the list leads to its page. */
  async function tellPlace(kind: 'tank' | 'box', code: string): Promise<void> {
    await list.run(code, null, () =>
      Promise.resolve({ detail: `Open the ${kind}`, to: { name: `${kind}-address`, params: { code } } }),
    );
  }

  async function takePlug(code: string): Promise<void> {
    if (choices.act === 'look') await look(code);
    else if (isReady.value) await actOn(code);
    else wait(code);
  }

  function wait(code: string): void {
    waiting.value = code;
    signal(choices.act === 'measure' ? 'done' : 'again');
  }

  const isReady = computed(
    () =>
      choices.act === 'look' ||
      (choices.act === 'move' && rack.value !== null) ||
      (choices.act === 'loss' && choices.seen !== null),
  );

  async function look(code: string): Promise<void> {
    await list.run(formatPlugCode(code), null, async () => {
      const plug = await acts.findPlug(code);
      foundPlug.value = plug;
      foundRack.value = null;
      return {
        detail: `${plug.line.tradeName}, ${plug.rack ? placeWords(plug.rack.code, plug.position) : PLUG_STATES[plug.state].label}`,
        to: { name: 'plug', params: { code } },
      };
    });
  }

  /** Moves a plug or records its loss, by what is chosen. */
  async function actOn(code: string): Promise<void> {
    waiting.value = null;
    if (choices.act === 'move' && rack.value) await move(code, rack.value);
    if (choices.act === 'loss' && choices.seen) await lose(code, choices.seen, choices.cause);
  }

  async function move(code: string, target: Rack): Promise<void> {
    const key = newKey();
    const start = choices.startPosition;
    await once(code, `move ${code} ${target.id} ${start ?? ''}`, async () => {
      const { groupId, plugs } = await acts.place(code, target.id, start, key);
      return {
        detail: `To ${placeWords(target.code, plugs[0]?.position ?? null)}`,
        undo: () => acts.undoAct(groupId),
      };
    });
  }

  async function lose(code: string, seen: LossSeen, cause: LossCause): Promise<void> {
    const key = newKey();
    await once(code, `loss ${code}`, async () => {
      const { groupId } = await acts.recordLoss(code, seen, cause, key);
      return {
        detail: `Lost: ${LOSS_SEEN.find((each) => each.code === seen)?.label ?? seen}`,
        undo: () => acts.undoAct(groupId),
      };
    });
  }

  async function measure(sizeMm: number): Promise<void> {
    const code = waiting.value;
    if (code === null) return;
    const key = newKey();
    waiting.value = null;
    await list.run(formatPlugCode(code), null, async () => {
      const { ids } = await acts.measure(code, sizeMm, key);
      return {
        detail: units.say('length', sizeMm, { decimals: units.unitFor('length') === 'mm' ? 1 : undefined }),
        undo: () => Promise.all(ids.map((id) => acts.undoMeasurement(id))),
      };
    });
  }

  async function once(code: string, sameAs: string, act: Parameters<typeof list.run>[2]): Promise<void> {
    if (list.alreadyDone(sameAs)) {
      notice.value = `${formatPlugCode(code)} is on this list already.`;
      signal('again');
      return;
    }
    await list.run(formatPlugCode(code), sameAs, act);
  }

  function moveTo(target: Rack): void {
    choices.act = 'move';
    choices.rackId = target.id;
    choices.startPosition = null;
    foundRack.value = null;
  }

  /** Another act; `code` goes along where a plug was scanned first. */
  function choose(act: ScanAct, code: string | null = null): void {
    choices.act = act;
    waiting.value = code;
    foundPlug.value = null;
    foundRack.value = null;
    notice.value = '';
  }

  return reactive({
    ...{ choices, rack, foundPlug, foundRack, waiting, notice, isReady, take, actOn, measure, moveTo, choose },
    ...{ entries: list.entries, undo: list.undo },
  });
}

function placeWords(rackCode: string, position: string | null): string {
  return position === null ? `${rackCode}, loose` : `${rackCode}, ${position}`;
}
