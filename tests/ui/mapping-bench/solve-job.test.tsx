import { render, screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { describe, expect, test, vi } from 'vitest';
import type { BenchCalls } from '@/components/mapping-bench/bench-calls';
import { firstSettings } from '@/components/mapping-bench/solve/solve-state';
import { useSolveJob } from '@/components/mapping-bench/solve/use-solve-job';
import type { AskKind } from '@/lib/solver/solve-ask';
import { ids, tile } from '../../unit/mapping-bench/bench-fixture';

const ask = { kind: 'pin price', op: ids.left, tile: tile(0), side: 'with pin' } as const;

/** Asks, and shows what `begin` has answered. The server is what the test says it is. */
function Asking({ isOrdinary, ...parts }: Parameters<typeof useSolveJob>[0] & { isOrdinary: boolean }) {
  const { begin } = useSolveJob(parts);
  const settings = isOrdinary ? firstSettings : { ...firstSettings, ask };
  return (
    <button
      type="button"
      onClick={async (event) => {
        const button = event.currentTarget;
        button.textContent = `began ${await begin({ settings, pins: {}, startPlacement: null })}`;
      }}
    >
      begin
    </button>
  );
}

async function asked(
  isOrdinary: boolean,
  answer: { created: boolean; asks: AskKind | null } | 'unreachable',
) {
  const startSolve = vi.fn<BenchCalls['startSolve']>(async () => {
    if (answer === 'unreachable') throw new Error('offline');
    return { ok: true, value: { solveId: 'solve_1', ...answer } };
  });
  const [onError, onOther] = [vi.fn(), vi.fn()];
  // What runs is read from the server again and again; here it never answers.
  vi.stubGlobal('fetch', () => new Promise(() => {}));
  render(
    <Asking
      isOrdinary={isOrdinary}
      workspace="w"
      draftId="draft_1"
      firstSolveId={null}
      calls={{ startSolve, stopSolve: vi.fn() }}
      onError={onError}
      onOther={onOther}
    />,
  );
  await userEvent.setup().click(screen.getByRole('button'));
  const began = (await screen.findByText(/^began/)).textContent;
  vi.unstubAllGlobals();
  return { began, onError, onOther };
}

const runsAlready = 'Another solve of this bench runs already. Ask again when it has ended.';

describe('asking for a solve', () => {
  test.each([
    [true, null],
    [false, 'pin price'],
  ] as const)('that is made (ordinary: %s) answers its id', async (isOrdinary, asks) => {
    const { began, onError, onOther } = await asked(isOrdinary, { created: true, asks });
    expect(began).toBe('began solve_1');
    expect(onError).not.toHaveBeenCalled();
    expect(onOther).not.toHaveBeenCalled();
  });

  test.each([
    ['an ordinary one', true, 'another'],
    ['a question', false, null],
  ] as const)('%s while one of the other sort runs hands that one over', async (_, isOrdinary, asks) => {
    const { began, onError, onOther } = await asked(isOrdinary, { created: false, asks });
    expect(began).toBe('began null');
    expect(onOther).toHaveBeenCalledExactlyOnceWith('solve_1');
    expect(onError).toHaveBeenCalledExactlyOnceWith(runsAlready);
  });

  test('while one of its own sort runs keeps that one and says so', async () => {
    const { began, onError, onOther } = await asked(false, { created: false, asks: 'another' });
    expect(began).toBe('began null');
    expect(onOther).not.toHaveBeenCalled();
    expect(onError).toHaveBeenCalledExactlyOnceWith(runsAlready);
  });

  test('of a server that does not answer starts nothing and says so', async () => {
    const { began, onError } = await asked(true, 'unreachable');
    expect(began).toBe('began null');
    expect(onError).toHaveBeenCalledExactlyOnceWith(
      'The server does not answer. Nothing was started; try again.',
    );
  });
});
