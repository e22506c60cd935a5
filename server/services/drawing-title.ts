/** How a sentence names a drawing: by its number, by its title, or as long as it has neither by its file's name. */
export function drawingTitle(drawing: { number: string; title: string; fileName: string }): string {
  return drawing.number || drawing.title || drawing.fileName;
}
