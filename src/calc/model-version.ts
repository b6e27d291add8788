/** Version of the model, written into every record. It is raised whenever a figure of a shipped preset moves by more than 1e-9. */
export const modelVersion = '1';
