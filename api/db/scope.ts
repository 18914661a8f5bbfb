/** What a question to the database may see: the rows of one studio. */
export interface StudioScope {
  studioId: string;
}
