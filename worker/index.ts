export { enqueueNight, workUntilStopped } from './fleet.ts';
export type { PoolOptions } from './measure-pool.ts';
export { queueOwner, WorkspaceBusy } from './owner-lock.ts';
export { type NightPlan, planNight } from './plan-night.ts';
export { recordPlan, runNight, type RunProgress, type RunRequest, type RunSummary } from './run-night.ts';
export { PathFault } from './walk-paths.ts';
export { type Workspace, workspaceAt } from './workspace.ts';
export { requeueSpectra, workspaceStatus } from './workspace-status.ts';
