import { BaseSequencer, type TestSpecification } from 'vitest/node';

/** Folders whose files take longest, by how long. */
const LONG = ['/test/browser/', '/test/faults/', '/test/golden/'];

/** Starts what takes longest first, so that no core waits at the end for a long file on the other. */
export class BrowserFirst extends BaseSequencer {
  override async sort(files: TestSpecification[]): Promise<TestSpecification[]> {
    const sorted = await super.sort(files);
    const projects = [...new Set(sorted.map(({ project }) => project.name))];
    const rank = ({ project, moduleId }: TestSpecification) => {
      const long = LONG.findIndex((folder) => moduleId.includes(folder));
      return projects.indexOf(project.name) * (LONG.length + 1) + (long === -1 ? LONG.length : long);
    };
    return sorted.sort((a, b) => rank(a) - rank(b));
  }
}
