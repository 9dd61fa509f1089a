import { mkdirSync } from 'node:fs';
import { join, resolve } from 'node:path';
import { asEnvironmentFault } from '../store/index.ts';

/** Where everything of one survey lives on this machine. All paths are absolute. */
export interface Workspace {
  readonly directory: string;
  readonly store: string;
  readonly queue: string;
  readonly logs: string;
  /** Folder of what is handed out of one night. */
  night(name: string): string;
}

/** Names the places of a workspace without touching the disk. */
export function workspaceAt(directory: string): Workspace {
  const root = resolve(directory);
  return {
    directory: root,
    store: join(root, 'store.sqlite'),
    queue: join(root, 'queue'),
    logs: join(root, 'logs'),
    night: (name) => join(root, 'nights', folderName(name)),
  };
}

/**
 * Makes the folders of a workspace that are missing.
 *
 * @throws EnvironmentFault when they cannot be made
 */
export function makeWorkspace(directory: string): Workspace {
  const workspace = workspaceAt(directory);
  try {
    for (const folder of [workspace.queue, workspace.logs, join(workspace.directory, 'nights')]) {
      mkdirSync(folder, { recursive: true });
    }
  } catch (error) {
    throw asEnvironmentFault(error);
  }
  return workspace;
}

/** A night's name as a folder: what could climb out of the workspace or upset a file system becomes `_`. */
function folderName(night: string): string {
  return night.replace(/[^A-Za-z0-9._-]/g, '_').replace(/^\.+/, '_');
}
