/** The arrows between the layers: what may import what. `npm test` fails where a file points the wrong way. */
const layer = (name, from, to) => ({ name, severity: 'error', from: { path: from }, to: { path: to } });

module.exports = {
  forbidden: [
    { name: 'no-circles', severity: 'error', from: {}, to: { circular: true, viaOnly: { dependencyTypesNot: ['type-only'] } } },
    layer('domain-imports-nothing-else', '^api/domain/', '^(api/(?!domain/)|web/)'),
    layer('contract-stands-on-domain', '^api/contract/', '^(api/(?!contract/|domain/)|web/)'),
    layer('plumbing-knows-no-feature', '^api/(db|services|imaging|models)/', '^api/(features|middleware|app\\.ts|server\\.ts|worker\\.ts)'),
    layer('features-know-no-app', '^api/features/', '^api/(app|server|worker)\\.ts'),
    layer('domain-runs-in-the-browser', '^api/(domain|contract)/', '^node:'),
    {
      name: 'no-routes-of-another-feature',
      severity: 'error',
      from: { path: '^api/features/([^/]+)/' },
      to: { path: '^api/features/([^/]+)/routes\\.ts$', pathNot: '^api/features/$1/' },
    },
    layer('web-sees-contract-and-domain-only', '^web/', '^api/(?!contract/|domain/)'),
    layer('ui-knows-no-business', '^web/src/ui/', '^web/src/(pages|features)/'),
    layer('lib-knows-no-react-part', '^web/src/lib/', '^web/src/(pages|features|ui)/'),
    layer('features-know-no-page', '^web/src/features/', '^web/src/pages/'),
    layer('api-knows-no-web', '^api/', '^web/'),
  ],
  options: {
    doNotFollow: { path: 'node_modules' },
    tsPreCompilationDeps: true,
    tsConfig: { fileName: 'tsconfig.json' },
    enhancedResolveOptions: { extensions: ['.ts', '.tsx', '.js', '.json'] },
  },
};
