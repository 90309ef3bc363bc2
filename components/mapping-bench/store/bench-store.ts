/** One store for each bench: content with undo, what is picked up and pointed at, and the last thing said. */
import { createStore, type StoreApi } from 'zustand';
import { compileFabric, type FabricGraph } from '@/lib/fabric/compile';
import type { Fabric, LinkId, TileId } from '@/lib/fabric/fabric';
import { builtInLibrary, type UnitLibrary } from '@/lib/fabric/unit-library';
import type { Kernel, OpId } from '@/lib/graph/kernel';
import type { Pins, Placement, Provenance, Routes } from '@/lib/mapping/mapping';
import { shortName } from '@/lib/mapping/picture/op-label';
import type { Result } from '@/lib/result';
import {
  type BenchContent,
  type BenchSetting,
  type Change,
  clear,
  opsByTile,
  place,
  takeResult,
  tileRefusal,
  togglePin,
  unplace,
} from './bench-content';
import { type BenchFacts, benchFacts } from './bench-facts';

interface Step {
  content: BenchContent;
  /** What led away from it. */
  said: string;
}

/** Things to look at: a broken rule's, or those that a reason names. */
export interface Marks {
  opIds: readonly OpId[];
  tileIds: readonly TileId[];
  linkIds: readonly LinkId[];
}

export interface BenchState {
  content: BenchContent;
  facts: BenchFacts;
  byTile: ReadonlyMap<number, OpId>;
  past: readonly Step[];
  future: readonly Step[];
  /** The op that is picked up, by click, key or drag. */
  held: OpId | null;
  pointedOp: OpId | null;
  pointedTile: number | null;
  marks: Marks | null;
  /** Where the keyboard is on the grid. */
  cursor: number;
  said: { text: string; refused: boolean };
  readOnly: boolean;
  point(op: OpId | null, tile: number | null): void;
  mark(marks: Marks | null): void;
  moveCursor(tile: number): void;
  say(text: string, refused?: boolean): void;
  pick(op: OpId | null): void;
  /** Puts the held op on a tile; true when it is there. */
  putDown(tile: number): boolean;
  /** A click on a tile: puts down what is held, else picks up what is there. */
  press(tile: number): void;
  unplace(op: OpId): void;
  clear(): void;
  togglePin(op: OpId): void;
  takeResult(
    result: { placement: Placement; routes: Routes; provenance: Provenance },
    how?: { said?: string; pins?: Pins },
  ): void;
  /** Replaces everything as one step: somebody else's state or a local backup. */
  replace(content: BenchContent, said: string): void;
  undo(): void;
  redo(): void;
  refusal(op: OpId, tile: number): string | null;
}

export type BenchStore = StoreApi<BenchState> & { setting: BenchSetting; fabric: Fabric };

const STEPS_KEPT = 500;

export function benchSetting(kernel: Kernel, graph: FabricGraph, library: UnitLibrary): BenchSetting {
  return { kernel, graph, library, ops: new Map(kernel.ops.map((op) => [op.id, op])) };
}

export function createBenchStore(of: {
  kernel: Kernel;
  fabric: Fabric;
  content: BenchContent;
  readOnly?: boolean;
  library?: UnitLibrary;
}): BenchStore {
  const setting = benchSetting(of.kernel, compileFabric(of.fabric), of.library ?? builtInLibrary);
  const derive = (content: BenchContent) => ({
    content,
    facts: benchFacts(setting, of.fabric, content),
    byTile: opsByTile(setting.graph, content.placement),
  });
  const nameOf = (id: OpId) => {
    const op = setting.ops.get(id);
    return op ? shortName(op) : id;
  };
  const store = createStore<BenchState>()((set, get) => {
    const perform = ({ content, said }: Change) => {
      const now = get();
      if (now.readOnly) return;
      if (content === now.content) {
        set({ said: { text: said, refused: false }, held: null });
        return;
      }
      set({
        ...derive(content),
        past: [...now.past, { content: now.content, said }].slice(-STEPS_KEPT),
        future: [],
        held: null,
        marks: null,
        said: { text: said, refused: false },
      });
    };
    const attempt = (change: Result<Change, string>): boolean => {
      if (change.ok) perform(change.value);
      else set({ said: { text: change.error, refused: true } });
      return change.ok;
    };
    return {
      ...derive(of.content),
      past: [],
      future: [],
      held: null,
      pointedOp: null,
      pointedTile: null,
      marks: null,
      cursor: 0,
      said: { text: '', refused: false },
      readOnly: of.readOnly ?? false,
      point: (pointedOp, pointedTile) => {
        const now = get();
        if (now.pointedOp !== pointedOp || now.pointedTile !== pointedTile) set({ pointedOp, pointedTile });
      },
      mark: (marks) => set({ marks }),
      moveCursor: (cursor) => set({ cursor }),
      say: (text, refused = false) => set({ said: { text, refused } }),
      pick: (op) => {
        if (get().readOnly) return;
        if (op === null) {
          set({ held: null, said: { text: get().held ? 'Put back.' : '', refused: false } });
          return;
        }
        set({
          held: op,
          said: { text: `${nameOf(op)} picked up: choose a tile, Escape puts it back.`, refused: false },
        });
      },
      putDown: (tile) => {
        const { held, content } = get();
        return held !== null && attempt(place(setting, content, held, tile));
      },
      press: (tile) => {
        const { held, byTile, putDown, pick } = get();
        if (held !== null) putDown(tile);
        else {
          const there = byTile.get(tile);
          if (there !== undefined) pick(there);
        }
      },
      unplace: (op) => void attempt(unplace(setting, get().content, op)),
      clear: () => void attempt(clear(setting, get().content)),
      togglePin: (op) => void attempt(togglePin(setting, get().content, op)),
      takeResult: (result, how) => perform(takeResult(get().content, result, how)),
      replace: (content, said) => perform({ content, said }),
      undo: () => {
        const { past, future, content, readOnly } = get();
        const step = past.at(-1);
        if (!step || readOnly) return;
        set({
          ...derive(step.content),
          past: past.slice(0, -1),
          future: [{ content, said: step.said }, ...future],
          held: null,
          marks: null,
          said: { text: `Undone: ${step.said}`, refused: false },
        });
      },
      redo: () => {
        const { past, future, content, readOnly } = get();
        const step = future[0];
        if (!step || readOnly) return;
        set({
          ...derive(step.content),
          past: [...past, { content, said: step.said }],
          future: future.slice(1),
          held: null,
          marks: null,
          said: { text: `Redone: ${step.said}`, refused: false },
        });
      },
      refusal: (op, tile) => tileRefusal(setting, get().content, op, tile),
    };
  });
  return Object.assign(store, { setting, fabric: of.fabric });
}
