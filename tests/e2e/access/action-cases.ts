/**
 * Every server action with an input that somebody who may call it can send, and the least that a caller needs.
 * A new action without a line here fails the test of completeness.
 */
import type { Role } from '../../../lib/roles';
import { gaugeKernel } from '../../helpers/documents';
import { byHand, nothingPlaced, type Scene } from './scene';

/** `nobody` needs to be signed in; `anybody` has to be, in any workspace; else the least role in the workspace. */
export type Need = 'nobody' | 'anybody' | Role;

export interface ActionCase {
  name: string;
  need: Need;
  /** What the action gets beside the workspace. */
  input(scene: Scene): Promise<object> | object;
  /** True when the input names something of the workspace by its id. */
  namesThings?: true;
  /** What a permitted caller is answered; "ok" where it is not said. */
  answer?: string;
  /** The only one who tries it with permission, where it would cost the demonstration's people their place. */
  permitted?: 'guest';
}

const bogusToken = { token: 'A'.repeat(43) };
const password = 'quiet looms weave slowly';

export const actionCases: readonly ActionCase[] = [
  // The doors.
  { name: 'requestSignUpAction', need: 'nobody', input: () => ({ email: 'newcomer@tarnbrook.example' }) },
  {
    name: 'completeSignUpAction',
    need: 'nobody',
    input: () => ({ ...bogusToken, name: 'New', workspaceName: 'New', password }),
    answer: 'not_found',
  },
  {
    name: 'signInAction',
    need: 'nobody',
    input: () => ({ email: 'nobody@tarnbrook.example', password }),
    answer: 'invalid',
  },
  { name: 'signOutAction', need: 'nobody', input: () => ({}) },
  { name: 'requestResetAction', need: 'nobody', input: () => ({ email: 'nobody@tarnbrook.example' }) },
  {
    name: 'completeResetAction',
    need: 'nobody',
    input: () => ({ ...bogusToken, password }),
    answer: 'not_found',
  },
  {
    name: 'acceptAsNewAction',
    need: 'nobody',
    input: () => ({ ...bogusToken, name: 'New', password }),
    answer: 'not_found',
  },
  { name: 'acceptAction', need: 'anybody', input: () => bogusToken, answer: 'not_found' },
  { name: 'makeWorkspaceAction', need: 'anybody', input: () => ({ name: 'Second workspace' }) },
  // One's own account.
  { name: 'renameAccountAction', need: 'anybody', input: () => ({ name: 'Renamed outsider' }) },
  {
    name: 'changePasswordAction',
    need: 'anybody',
    input: () => ({ current: 'not the password', password, endOthers: false }),
    answer: 'invalid',
  },
  {
    name: 'endSessionAction',
    need: 'anybody',
    input: () => ({ sessionId: '0'.repeat(64) }),
    answer: 'not_found',
  },
  { name: 'endOtherSessionsAction', need: 'anybody', input: () => ({}) },
  { name: 'chooseThemeAction', need: 'anybody', input: () => ({ theme: 'dark' }) },
  // Members and the workspace.
  {
    name: 'inviteAction',
    need: 'owner',
    input: () => ({ email: `asked-${Date.now()}@tarnbrook.example`, role: 'viewer' }),
  },
  ...(['inviteAgainAction', 'withdrawInvitationAction'] as const).map(
    (name): ActionCase => ({
      name,
      need: 'owner',
      namesThings: true,
      input: async ({ invitationId }) => ({ invitationId: await invitationId() }),
    }),
  ),
  {
    name: 'setRoleAction',
    need: 'owner',
    namesThings: true,
    input: async ({ guestId }) => ({ userId: await guestId(), role: 'reviewer' }),
  },
  {
    name: 'removeMemberAction',
    need: 'owner',
    namesThings: true,
    input: async ({ guestId }) => ({ userId: await guestId() }),
  },
  {
    name: 'leaveAction',
    need: 'viewer',
    permitted: 'guest',
    input: async ({ guestId }) => {
      await guestId();
      return {};
    },
  },
  { name: 'renameWorkspaceAction', need: 'owner', input: () => ({ name: 'Tarnbrook' }) },
  // Kernels.
  { name: 'createKernelAction', need: 'editor', input: () => ({ document: gaugeKernel() }) },
  {
    name: 'keepKernelVersionAction',
    need: 'editor',
    namesThings: true,
    input: async ({ kernelId }) => ({ kernelId: await kernelId(), revision: 1, label: 'Tried' }),
  },
  {
    name: 'saveKernelDraftAction',
    need: 'editor',
    namesThings: true,
    input: async ({ kernelId }) => ({
      kernelId: await kernelId(),
      revision: 1,
      document: gaugeKernel('Saved anew'),
    }),
  },
  {
    name: 'duplicateKernelAction',
    need: 'editor',
    namesThings: true,
    input: async ({ kernelId }) => ({ kernelId: await kernelId() }),
  },
  {
    name: 'archiveKernelAction',
    need: 'editor',
    namesThings: true,
    input: async ({ kernelId }) => ({ kernelId: await kernelId(), archived: true }),
  },
  // Fabrics.
  {
    name: 'createFabricAction',
    need: 'editor',
    input: () => ({
      form: {
        name: 'Tried',
        rows: '2',
        cols: '2',
        topology: 'mesh',
        mix: 'memoryEdges',
        channels: '1',
        bufferDepth: '2',
        memoryBanks: '1',
        clock: null,
      },
    }),
  },
  {
    name: 'importFabricAction',
    need: 'editor',
    input: () => ({ text: 'no fabric' }),
    answer: 'invalid',
  },
  {
    name: 'keepFabricVersionAction',
    need: 'editor',
    namesThings: true,
    input: async ({ fabricId }) => ({ fabricId: await fabricId(), revision: 1, label: 'Tried' }),
  },
  {
    name: 'renameFabricAction',
    need: 'editor',
    namesThings: true,
    input: async ({ fabricId }) => ({ fabricId: await fabricId(), name: 'Renamed' }),
  },
  {
    name: 'duplicateFabricAction',
    need: 'editor',
    namesThings: true,
    input: async ({ fabricId }) => ({ fabricId: await fabricId() }),
  },
  {
    name: 'archiveFabricAction',
    need: 'editor',
    namesThings: true,
    input: async ({ fabricId }) => ({ fabricId: await fabricId(), archived: true }),
  },
  // Benches and mappings.
  {
    name: 'createBench',
    need: 'editor',
    namesThings: true,
    input: async ({ kernelId, fabricId }) => ({
      name: 'Tried',
      kernelId: await kernelId(),
      fabricId: await fabricId(),
    }),
  },
  {
    name: 'saveBench',
    need: 'editor',
    namesThings: true,
    input: async ({ draftId }) => ({
      draftId: await draftId(),
      revision: 1,
      document: nothingPlaced,
      provenance: byHand,
    }),
  },
  {
    name: 'saveBenchAsNew',
    need: 'editor',
    namesThings: true,
    input: async ({ draftId }) => ({
      draftId: await draftId(),
      name: 'Beside it',
      document: nothingPlaced,
      provenance: byHand,
    }),
  },
  {
    name: 'renameBench',
    need: 'editor',
    namesThings: true,
    input: async ({ draftId }) => ({ draftId: await draftId(), name: 'Renamed' }),
  },
  {
    name: 'keepAsMapping',
    need: 'editor',
    namesThings: true,
    // Nothing lies on the bench yet, so the permitted are told that it is not complete.
    input: async ({ draftId }) => ({ draftId: await draftId(), name: 'Kept', revision: 1 }),
    answer: 'invalid',
  },
  {
    name: 'continueFromMapping',
    need: 'editor',
    namesThings: true,
    input: async ({ mappingId }) => ({ mappingId: await mappingId() }),
  },
  {
    name: 'renameKeptMapping',
    need: 'editor',
    namesThings: true,
    input: async ({ mappingId }) => ({ mappingId: await mappingId(), name: 'Renamed' }),
  },
  {
    name: 'setArchived',
    need: 'editor',
    namesThings: true,
    input: async ({ mappingId }) => ({ id: await mappingId(), archived: true }),
  },
  {
    name: 'startSolve',
    need: 'editor',
    namesThings: true,
    input: async ({ draftId }) => ({
      draftId: await draftId(),
      settings: { engine: 'search', objective: 'wire', timeLimitMs: 1000, seed: 1 },
      pins: {},
      startPlacement: null,
    }),
  },
  {
    name: 'stopSolve',
    need: 'editor',
    namesThings: true,
    input: async ({ solveId }) => ({ solveId: await solveId() }),
  },
];
