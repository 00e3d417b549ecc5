import { packageBuild } from '../../tools/build/tsup-preset.mjs';

export default packageBuild(['src/*.ts']);
