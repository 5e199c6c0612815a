/**
 * A crew's worker whose method does what its settings say: `script` names one of these. Plain JavaScript, since worker
 * threads load it without the tests' compiler.
 */
const scripts = {
  good: ({ designs, scores, batchSize }) => ({
    designs: firstRows(designs, batchSize),
    believed: scores.slice(0, batchSize),
  }),
  throws: () => {
    throw new Error('the colony\ncollapsed');
  },
  'throws-a-word': () => {
    throw 'no bees';
  },
  rejects: () => Promise.reject(new Error('no nectar')),
  'throws-unseen': () => {
    setTimeout(() => {
      throw new Error('nobody listens');
    }, 5);
    return forever();
  },
  'rejects-unseen': () => {
    Promise.reject(new Error('nobody waits'));
    return forever();
  },
  hangs: () => {
    for (;;);
  },
  waits: () => forever(),
  exits: () => process.exit(0),
  'exits-as-failed': () => process.exit(7),
  nothing: () => undefined,
  function: (offer) => ({ ...scripts.good(offer), explain: () => 'because' }),
  nan: (offer) => changed(offer, Number.NaN),
  outside: (offer) => changed(offer, 1e9),
  few: ({ designs }) => ({ designs: firstRows(designs, 1) }),
  vandal: (offer) => {
    offer.designs.values.fill(0);
    offer.scores.fill(1e9);
    offer.space.columns.length = 0;
    return scripts.good(offer);
  },
};

async function answer({ job, started }) {
  started.postMessage('started');
  try {
    const proposed = await scripts[job.settings.script](job.offer);
    return { kind: 'proposed', proposal: structuredClone(proposed), seconds: 0.25 };
  } catch (error) {
    const reason = String(error instanceof Error ? error.message : error).replace(/\s+/g, ' ');
    return { kind: 'threw', reason, seconds: 0.5 };
  } finally {
    started.close();
  }
}

function firstRows({ columns, values }, rows) {
  return { rows, columns, values: values.slice(0, rows * columns) };
}

function changed(offer, value) {
  const proposal = scripts.good(offer);
  proposal.designs.values[1] = value;
  return proposal;
}

function forever() {
  return new Promise(() => {
    setInterval(() => {}, 1000);
  });
}

// biome-ignore lint/style/noDefaultExport: a crew loads the default export of its worker's module
export default answer;
