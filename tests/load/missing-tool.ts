/** A bench needs a program that is not there and could not be installed; the message says how to get it. */
export class MissingTool extends Error {
  override readonly name = 'MissingTool';
}
