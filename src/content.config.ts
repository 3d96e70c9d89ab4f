import { defineCollection } from 'astro:content';
import { glob } from 'astro/loaders';
import { z } from 'astro/zod';

/** Texts that people read: help, one page each, and the parts of the method page in their order. */
const help = defineCollection({
  loader: glob({ pattern: '*.md', base: './src/content/help' }),
  schema: z.object({ title: z.string(), summary: z.string(), order: z.number() }),
});

const method = defineCollection({
  loader: glob({ pattern: '*.md', base: './src/content/method' }),
  schema: z.object({ title: z.string(), order: z.number() }),
});

export const collections = { help, method };
