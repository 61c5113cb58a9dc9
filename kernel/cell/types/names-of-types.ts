/** A printed type without the files in which its names are declared. */
export function withoutPlaces(text: string): string {
  return text.replace(/import\("[^"]*"\)\.|\$+op_types\./g, "");
}
