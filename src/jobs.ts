import type { JobRegistry } from '@/server/queue';

/** Every kind of job there is: one explicit list, handlers loaded when first needed. */
export const registry: JobRegistry = {
  mail: { load: () => import('@/server/mail').then((mail) => mail.sendMail) },
  import: {
    load: async () => (await import('@/features/imports/index.server')).importJob,
    ended: async () => (await import('@/features/imports/index.server')).importEnded,
  },
  grouping: {
    load: async () => (await import('@/features/groupings/index.server')).groupingJob,
    ended: async () => (await import('@/features/groupings/index.server')).groupingEnded,
  },
  reading: {
    load: async () => (await import('@/features/readings/index.server')).readingJob,
    ended: async () => (await import('@/features/readings/index.server')).readingEnded,
  },
};
