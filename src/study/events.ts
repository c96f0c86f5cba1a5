/** `events`: every zero event that the action allows up to a codimension, and the collisions of codimension 1; no Hamiltonian is needed. */
import { simpleCollisions } from '../event/collision-list.ts';
import { zeroEvents } from '../event/event-list.ts';
import { motionOf } from '../event/zero-event.ts';
import type { Declaration } from '../model/declaration/index.ts';
import { measuredBlocks } from './capacity.ts';
import { structureOf } from './components.ts';
import type { ComponentSummary, EventSummary, InertiaSummary, Motion, StudyResult } from './result.ts';
import { componentSummaries } from './summary.ts';

/** Codimension up to which events are listed where none is asked for. */
export const DEFAULT_CODIMENSION = 2;

export interface ListedEventSummary extends EventSummary {
  /** Inertia of S on the generalised kernel. */
  readonly inertia: InertiaSummary;
  /** Eigenvalues of S that change their sign in a versal family of one parameter; for codimension 1 alone. */
  readonly signChanges?: number;
}

export interface ListedCollisionSummary {
  readonly kind: 'imaginary' | 'real';
  readonly components: readonly string[];
  readonly blocks: readonly number[];
  readonly codimension: 1;
  readonly motion: Motion;
  readonly between: string;
}

export interface EventsResult extends StudyResult {
  readonly components: readonly ComponentSummary[];
  /** The list goes up to this codimension. */
  readonly upTo: number;
  readonly events: readonly ListedEventSummary[];
  /** Collisions off zero of codimension 1 that the action allows. */
  readonly collisionTypes: readonly ListedCollisionSummary[];
}

/** The result of `events`. Throws the typed errors of the library, LimitError for a list that is too long. */
export async function eventsResult(declaration: Declaration): Promise<EventsResult> {
  const upTo = declaration.codimension ?? DEFAULT_CODIMENSION;
  const structure = await structureOf(declaration);
  const capacities = measuredBlocks(structure.action, structure.components).map((b) => b.capacity);
  const { schema, ...head } = structure.head;
  return {
    schema,
    command: 'events',
    ...head,
    components: componentSummaries(structure.components),
    upTo,
    events: zeroEvents(capacities, upTo).map(({ parts: _, semisimple, ...e }) => ({
      ...e,
      motion: motionOf(e.codimension, semisimple),
      ...(e.codimension === 1 ? { signChanges: e.kernel } : {}),
    })),
    collisionTypes: simpleCollisions(capacities),
  };
}
