declare const made: unique symbol;

type ScopeFields =
  | { kind: 'workspace'; personId: string; workspaceId: string }
  | { kind: 'studio'; personId: string; studioId: string }
  | { kind: 'person'; personId: string }
  | { kind: 'job'; workspaceId: string }
  | { kind: 'studio-job'; studioId: string };

/** What a transaction may see. Only lib/auth and lib/jobs make one, after reading the membership or the job. */
export type Scope = ScopeFields & { readonly [made]: true };

export function makeScope(fields: ScopeFields): Scope {
  return fields as Scope;
}
