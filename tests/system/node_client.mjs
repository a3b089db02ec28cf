// A third client in another language: grpc-js with protos loaded at run time.
import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import path from 'node:path';
import { fileURLToPath } from 'node:url';

const root = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '..', '..');
const require = createRequire(path.join(root, 'tests', 'tools', 'package.json'));
const grpc = require('@grpc/grpc-js');
const loader = require('@grpc/proto-loader');

const [address] = process.argv.slice(2);
const definition = loader.loadSync('permitscreen/v1/screening_service.proto', {
  includeDirs: [path.join(root, 'protos'), path.join(root, 'protos', 'third_party')], enums: String, longs: String,
});
const { permitscreen: { v1 } } = grpc.loadPackageDefinition(definition);
const client = new v1.ScreeningService(address, grpc.credentials.createInsecure());

// proto-loader takes numbers of `optional` fields as they are and needs no oneof marks in requests.
const read = (...parts) => JSON.parse(readFileSync(path.join(root, ...parts), 'utf8'));
const file = '01-reactor-vessel-13-axles.json';
const { application } = read('deploy', 'demo', 'applications', file);
const expected = read('tests', 'oracle', 'demo_expected.json').applications.find((a) => a.file === file);

const screen = (request, milliseconds) => new Promise((resolve) => {
  client.ScreenApplication(request, { deadline: Date.now() + milliseconds }, (error, answer) => resolve({ error, answer }));
});

let passed = 0;
let failed = 0;
const check = (what, holds, why) => {
  console.log(`${holds ? 'ok' : 'not ok'} - node: ${what}`);
  if (holds) passed += 1;
  else { failed += 1; console.log(`    ${JSON.stringify(why)}`); }
};

const request = { application, policy: 'policies/ossel-demo', asOfDate: { year: 2026, month: 12, day: 1 }, view: 'SCREENING_VIEW_FULL' };
const { error, answer } = await screen(request, 60_000);
check('screens application 01', !error, error);
const crossings = answer?.screening?.crossings ?? [];
const verdicts = crossings.map((c) => [c.structure, c.verdict, c.rungId ?? '']);
const wanted = expected.crossings.map((c) => [c.structure, `VERDICT_${c.verdict}`, c.rungId ?? '']);
check('verdicts and rungs are the oracle\'s', JSON.stringify(verdicts) === JSON.stringify(wanted), { verdicts, wanted });
const far = expected.crossings.flatMap((c, i) => c.rungs.map((r, j) => [r.ratingFactor, crossings[i]?.rungs[j]?.ratingFactor]))
  .filter(([want, have]) => want !== null && !(Math.abs(want - have) <= 1e-9 * Math.max(1, Math.abs(want))));
check('rating factors are the oracle\'s within 1e-9', far.length === 0, far);

const refused = await screen({ ...request, policy: '' }, 60_000);
const details = refused.error?.metadata?.get('grpc-status-details-bin')?.[0]?.toString('utf8') ?? '';
check('an invalid request is INVALID_ARGUMENT with BadRequest in grpc-status-details-bin',
  refused.error?.code === grpc.status.INVALID_ARGUMENT && details.includes('google.rpc.BadRequest') && details.includes('policy'), refused.error);
const late = await screen(request, 1);
check('a deadline of 1 ms is DEADLINE_EXCEEDED, and no verdict comes', late.error?.code === grpc.status.DEADLINE_EXCEEDED && !late.answer, late);

client.close();
console.log(`${passed} passed, ${failed} failed`);
process.exit(failed ? 1 : 0);
