import type { TestProject } from 'vitest/node';
import { ensureBuilt } from '../../server/tasks/prepare.mjs';
import { makeTemplate, removeFolder } from './support/template.ts';

declare module 'vitest' {
  export interface ProvidedContext {
    template: string;
  }
}

/** Builds the client where that is due, and makes the farm that every browser test starts from. */
export default async function setUp(project: TestProject): Promise<() => void> {
  ensureBuilt();
  const template = await makeTemplate();
  project.provide('template', template);
  return () => {
    removeFolder(template);
  };
}
