import type { Provenance } from './provenance.ts';

/** Rules for contraction joints in slabs on ground. Inches and feet; windows in hours after finishing. */
export const jointRules = {
  spacingFactor: {
    min: 24,
    max: 36,
    source: {
      document: 'ACI 302.1R',
      section: 'Joint design: spacing 24 to 36 times the thickness',
      certainty: 'published',
    },
  },
  maxAspect: {
    value: 1.5,
    source: {
      document: 'ACI 302.1R',
      section: 'Panels about square, length at most 1.5 times the width',
      certainty: 'published',
    },
  },
  capFtCip6: {
    value: 15,
    source: {
      document: 'NRMCA CIP 6',
      section: 'Joints in concrete slabs on grade',
      certainty: 'from memory',
    },
  },
  capFt302: {
    value: 18,
    source: { document: 'ACI 302.1R', section: 'Joint spacing up to 18 ft', certainty: 'published' },
  },
  depthFraction: {
    value: 0.25,
    source: {
      document: 'ACI 302.1R',
      section: 'Saw cut depth one fourth of the slab',
      certainty: 'published',
    },
  },
  minDepthIn: {
    value: 1,
    source: { document: 'ACI 302.1R', section: 'Saw cut depth at least 1 in', certainty: 'from memory' },
  },
  earlyEntry: {
    depthIn: 1,
    maxThicknessIn: 9,
    source: {
      document: 'ACI 302.1R',
      section: 'Early-entry dry-cut saws, slabs up to 9 in',
      certainty: 'from memory',
    },
  },
  windowHours: {
    conventional: { min: 4, max: 12 },
    earlyEntry: { min: 1, max: 4 },
    source: {
      document: 'ACI 302.1R',
      section: 'Timing of saw cuts after finishing, hot to cold weather',
      certainty: 'published',
    },
  },
} as const satisfies Record<string, { readonly source: Provenance; readonly [value: string]: unknown }>;
