/** What pdfkit can do and its type declarations leave out. */
declare global {
  namespace PDFKit.Mixins {
    interface StructureElementOptions {
      /** Of a table header cell. */
      scope?: 'Column' | 'Row';
      /** Left, top, right, bottom in page points. */
      bbox?: [number, number, number, number];
      placement?: 'Block' | 'Inline';
    }
  }
}

/** What the metadata of a document consists of, here with its texts escaped. */
export type TitledDocumentInfo = PDFKit.DocumentInfo;
