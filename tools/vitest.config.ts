import { projectTests } from './build/vitest-preset.mjs';

export default projectTests('tools');
