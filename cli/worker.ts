import { lookUpMethod, type MethodReference } from '../harness/catalogue.js';
import { firstLine, type WorkerTask } from '../harness/crew.js';
import type { MethodAnswer, MethodJob } from '../harness/job.js';
import type { Method, Offer } from '../harness/method.js';
import { openStream } from '../harness/random.js';
import { composeParts, methods } from '../methods/index.js';
import { type BackendName, useBackend } from '../methods/surrogates/network/backend.js';

/** A crew's worker: runs one method on one offer. It knows no task: what a method could reach here is its offer. */
export default async function answer({ job, started }: WorkerTask): Promise<MethodAnswer> {
  await useBackend(job.backend as BackendName);
  const method = methodFor(job.method);
  started.postMessage('started');
  const start = performance.now();
  const seconds = () => (performance.now() - start) / 1000;
  try {
    const proposed = await method.propose(offerFor(job), job.settings);
    const proposal = structuredClone(proposed); // throws here, with a reason, what could not be posted
    return { kind: 'proposed', proposal, seconds: seconds() };
  } catch (error) {
    return { kind: 'threw', reason: firstLine(error), seconds: seconds() };
  } finally {
    started.close();
  }
}

function methodFor(reference: MethodReference): Method {
  return lookUpMethod({ methods, compose: composeParts }, reference);
}

function offerFor({ offer: { streamPath, ...rest } }: MethodJob): Offer {
  return { ...rest, stream: openStream(streamPath) };
}
