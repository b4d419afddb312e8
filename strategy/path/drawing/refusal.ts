/** A drawing that can't be read: the message is the sentence shown, saying what is wrong, where and what to do. Caught by `drawingRead`. */
export class DrawingRefusal extends Error {}
