import type { UserProjectConfigExport } from 'vitest/config';

export declare function projectTests(name: string): UserProjectConfigExport;
