/** What a scope's wrapped private key is bound to: it opens for this scope's row and no other. */
export const scopeKeyContext = (scopeId: string): string => `scope-key:${scopeId}`;
