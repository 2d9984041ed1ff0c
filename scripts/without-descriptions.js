/**
 * A Babel plugin for the browser's bundle. The contracts say of each endpoint and field what it is,
 * in which unit, with an example: words of the API's document, which the server writes and no screen
 * shows. Takes `.describe(…)` and `.meta(…)` away from schemas, and the same of endpoints; what the
 * schemas accept stays as it is.
 */
const documenting = new Set(['describe', 'meta']);
const documentingFields = new Set(['summary', 'bodyExample']);

const isShared = (filename) => /[\\/]shared[\\/]/.test(filename ?? '');

module.exports = ({ types }) => ({
  name: 'without-descriptions',
  visitor: {
    CallExpression: {
      exit(path, { filename }) {
        if (!isShared(filename)) return;
        const { callee } = path.node;
        if (types.isIdentifier(callee, { name: 'defineEndpoint' })) {
          const [endpoint] = path.node.arguments;
          endpoint.properties = endpoint.properties.filter(
            ({ key }) => !documentingFields.has(key?.name),
          );
        }
        if (!types.isMemberExpression(callee) || callee.computed) return;
        if (documenting.has(callee.property.name)) path.replaceWith(callee.object);
      },
    },
  },
});
