import { packageBuild } from '../../tools/build/tsup-preset.mjs';

export default packageBuild(['src/index.ts', 'src/kernels.ts']);
