// The set-up is written as plain ES modules, which jest cannot require; its tests get them as CommonJS.
const { transformSync } = require('esbuild');

module.exports = {
  process(source, file) {
    const { code, map } = transformSync(source, {
      format: 'cjs',
      target: 'node20',
      sourcefile: file,
      sourcemap: true,
      define: { 'import.meta.dirname': '__dirname', 'import.meta.filename': '__filename' },
    });
    return { code, map };
  },
};
