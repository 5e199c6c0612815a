/** The sections of `onebatch list`, in order. */
export const sectionNames = ['tasks', 'methods', 'surrogates', 'searches', 'cautions'] as const;

export type SectionName = (typeof sectionNames)[number];
