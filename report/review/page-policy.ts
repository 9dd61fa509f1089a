import { createHash } from 'node:crypto';

/** A report is megabytes of curves; what it states about itself stands in its first lines. */
export const HEAD_BYTES = 4_096;

const STATED = /<meta http-equiv="Content-Security-Policy" content="(?<policy>[^"]*)">/;

/** Every character a policy of ours is made of; a line break among them could end the header. */
const POLICY_CHARACTERS = /^[\w ;:'+/=-]+$/;

/** What holds for every page; a page may only add what it runs. `frame-ancestors` has no effect in a meta element. */
const NOTHING = "default-src 'none'; base-uri 'none'; form-action 'none'; frame-ancestors 'none'";

/** Policy (W3C CSP Level 3) of a page without scripts that has one style sheet inside it. */
export function styledPagePolicy(style: string): string {
  return `${NOTHING}; style-src 'sha256-${createHash('sha256').update(style).digest('base64')}'`;
}

/**
 * Policy for a report: the one the page states itself, which knows the hashes of its script and style sheets,
 * and that no other page may frame it.
 *
 * @param head the first bytes of the page as text
 * @returns a policy that allows nothing when the page states none that can be read
 */
export function reportPolicy(head: string): string {
  const policy = STATED.exec(head)?.groups?.['policy']?.replaceAll('&#39;', "'") ?? '';
  return POLICY_CHARACTERS.test(policy) ? `${policy}; frame-ancestors 'none'` : NOTHING;
}
