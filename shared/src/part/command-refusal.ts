/** Why a command cannot be applied. The client switches on it; the message is for the person. */
export type CommandRefusalCode =
  /** The command names a thing the document does not have (any more). */
  | 'unknownEntity'
  /** An id that the command brings is taken already. */
  | 'duplicateId'
  /** The command asks for a straight edge or a sharp corner and there is none. */
  | 'notStraight'
  | 'notACorner'
  /** A length, radius, angle or position that leads to nothing that could be drawn. */
  | 'impossibleSize'
  /** Fewer edges than a closed outline needs. */
  | 'tooFewEdges'
  /** The document would break one of its limits. */
  | 'limitExceeded'
  /** The fastener tables have no such thread for this purpose. */
  | 'unknownThread'
  /** An undo or redo whose ground somebody else has changed. */
  | 'changedSince';

/** Thrown by `applyCommand`; the document stays as it was. */
export class CommandRefusal extends Error {
  override readonly name = 'CommandRefusal';

  /**
   * @param code what went wrong
   * @param message one sentence for the person
   * @param ids edges, features, bends or loops concerned
   */
  constructor(
    readonly code: CommandRefusalCode,
    message: string,
    readonly ids: readonly string[],
  ) {
    super(message);
  }
}
