import type { InputProfile } from '../config/profile.ts';
import { planNight, workspaceAt } from '../worker/index.ts';

/** Lists what a run would measure, and writes nothing anywhere. */
export async function printPlan(request: {
  readonly paths: readonly string[];
  readonly night: string | null;
  readonly profile: InputProfile | null;
  readonly workspace: string;
}): Promise<void> {
  const skip = [workspaceAt(request.workspace).directory];
  const plan = await planNight({ ...request, skip });
  const lines = plan.inputs.map(({ input, spectra }) =>
    input.fault === null
      ? `${input.relativePath}: ${spectra.length} spectra`
      : `${input.relativePath}: ${input.fault.detail}`,
  );
  for (const { relativePath } of plan.leftOut) lines.push(`${relativePath}: left out, not spectra`);
  const total = plan.inputs.reduce((sum, { spectra }) => sum + spectra.length, 0);
  lines.push(`night ${plan.night}: ${total} spectra in ${plan.inputs.length} files`);
  process.stdout.write(`${lines.join('\n')}\n`);
}
