import { projectTests } from '../../tools/build/vitest-preset.mjs';

export default projectTests('gauge');
