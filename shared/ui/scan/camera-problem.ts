/** Why the camera shows nothing, and what to do; in words. Pure. */
export function cameraProblem(error: unknown): string {
  switch ((error as { name?: unknown } | null)?.name) {
    case 'NotAllowedError':
    case 'SecurityError':
      return 'The camera is not allowed here. Allow it in the browser’s settings for this page, or type the label.';
    case 'NotFoundError':
    case 'OverconstrainedError':
      return 'No camera was found on this device. Type the label.';
    case 'NotReadableError':
    case 'AbortError':
      return 'Another program has the camera. Close it and try again, or type the label.';
    default:
      return 'The camera could not be opened. Try again, or type the label.';
  }
}
