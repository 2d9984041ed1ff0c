/**
 * Who may import what. ESLint shows the sentence at the line that breaks a rule; the architecture
 * test reads the same table against the whole import graph.
 *
 * `importer` and `banned` are folders, `except` files or folders below a banned one, `unless`
 * files of the importer that the rule leaves out.
 */
const screens = ['app', 'components', 'hooks', 'constants'];
const innerServer = ['models', 'queue', 'chain', 'mail', 'threads'].map((name) => `server/${name}`);

const importRules = [
  {
    importer: ['pricing'],
    banned: [...screens, 'shared', 'server', 'scripts', 'tests'],
    sentence:
      'pricing imports nothing of the rest: it runs unchanged in the browser, on the server and in tests.',
  },
  {
    importer: ['shared'],
    banned: [...screens, 'server', 'scripts', 'tests'],
    sentence: 'shared is what client and server agree on; it knows neither of them.',
  },
  {
    importer: ['shared', 'app', 'components', 'constants', 'hooks'],
    unless: ['hooks/pricing.worker.ts'],
    banned: ['pricing'],
    except: ['pricing/contract.ts'],
    sentence:
      'Only hooks/pricing.worker.ts calls the engine in the browser; take types and checks from pricing/contract, or every route carries the engine.',
  },
  {
    importer: ['server', 'scripts', 'hooks'],
    banned: ['pricing'],
    except: ['pricing/index.ts', 'pricing/contract.ts', 'pricing/study.ts'],
    sentence:
      'The engine has one door, pricing/index (pricing/contract for its types, pricing/study for convergence studies).',
  },
  {
    importer: ['components/ui'],
    banned: ['app', 'components', 'hooks', 'shared', 'pricing', 'server', 'scripts', 'tests'],
    except: ['components/ui', 'shared/format'],
    sentence:
      'components/ui knows only the tokens in constants and shared/format, not the product.',
  },
  {
    importer: screens,
    banned: ['server', 'scripts', 'tests'],
    sentence: 'Screens reach the server through hooks and shared/api-client, never by import.',
  },
  {
    importer: ['components', 'hooks', 'constants'],
    banned: ['app'],
    sentence: 'app holds routes only; what others need has its place in components or hooks.',
  },
  {
    importer: ['server'],
    banned: [...screens, 'scripts', 'tests'],
    sentence: 'The server shares only shared and pricing with the screens.',
  },
  {
    importer: ['server/routes'],
    banned: ['server'],
    except: ['server/routes', 'server/services', 'server/middleware'],
    sentence: 'A route checks and calls a service; rules, tables and queue are the service’s.',
  },
  {
    importer: ['server/middleware', 'server/migrations', 'server/queue', 'server/mail'],
    banned: innerServer,
    except: ['server/queue', 'server/mail'],
    sentence: 'Only services call models, queue, chain, mail and threads.',
  },
  {
    importer: ['scripts'],
    banned: [...screens, 'server', 'tests'],
    sentence: 'scripts are plain launchers: they start the product and hold no part of it.',
  },
];

module.exports = { importRules };
