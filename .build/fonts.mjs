// The font files that ship with the program, by face, and their licences; paths are relative to node_modules. Semibold serves as
// bold: beside the regular weight it is distinct enough and keeps tables and charts calm.
export const fontFiles = {
  'serif': 'source-serif/TTF/SourceSerif4-Regular.ttf',
  'serif-italic': 'source-serif/TTF/SourceSerif4-It.ttf',
  'serif-bold': 'source-serif/TTF/SourceSerif4-Semibold.ttf',
  'sans': 'source-sans/TTF/SourceSans3-Regular.ttf',
  'sans-bold': 'source-sans/TTF/SourceSans3-Semibold.ttf',
  'sans-italic': 'source-sans/TTF/SourceSans3-It.ttf',
  'mono': 'source-code-pro/TTF/SourceCodePro-Regular.ttf',
  'fallback': 'dejavu-fonts-ttf/ttf/DejaVuSans.ttf',
  'fallback-bold': 'dejavu-fonts-ttf/ttf/DejaVuSans-Bold.ttf',
}

export const fontLicences = {
  'LICENCE-source-serif.md': 'source-serif/LICENSE.md',
  'LICENCE-source-sans.md': 'source-sans/LICENSE.md',
  'LICENCE-source-code-pro.md': 'source-code-pro/LICENSE.md',
  'LICENCE-dejavu.txt': 'dejavu-fonts-ttf/LICENSE',
}
