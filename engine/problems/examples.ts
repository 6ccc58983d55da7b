import { cavity } from './examples/cavity.ts';
import { channel } from './examples/channel.ts';
import type { WorkedExample } from './examples/example.ts';
import { footbridge } from './examples/footbridge.ts';
import { heatSink } from './examples/heatSink.ts';
import { network } from './examples/network.ts';
import { seepage } from './examples/seepage.ts';

/** The worked examples of the first screen. All invented; none is a design of anything. */
export const workedExamples: readonly WorkedExample[] = [footbridge, heatSink, network, cavity, channel, seepage];

/** The example of that id, or undefined. */
export function exampleById(id: string): WorkedExample | undefined {
  return workedExamples.find((example) => example.id === id);
}
