import type { CreateProjectRequest, Page, Project, RenameProjectRequest } from '@masswright/contracts';
import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { readAllPages } from '../../../lib/pages';
import { send } from '../../../lib/api';

export const projectsKey = ['projects'] as const;
export const projectKey = (projectId: string) => ['project', projectId] as const;

export function useProjects() {
  return useQuery({
    queryKey: projectsKey,
    queryFn: ({ signal }) => readAllPages((after) => send<Page<Project>>('GET', '/projects', { query: { after, limit: 200 }, signal })),
  });
}

export function useProject(projectId: string) {
  return useQuery({ queryKey: projectKey(projectId), queryFn: ({ signal }) => send<Project>('GET', `/projects/${projectId}`, { signal }) });
}

export function useCreateProject() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: CreateProjectRequest) => send<Project>('POST', '/projects', { body }),
    onSuccess: (project) => {
      client.setQueryData(projectKey(project.id), project);
      return client.invalidateQueries({ queryKey: projectsKey });
    },
  });
}

export function useRenameProject(projectId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: RenameProjectRequest) => send<Project>('PATCH', `/projects/${projectId}`, { body }),
    onSuccess: (project) => {
      client.setQueryData(projectKey(project.id), project);
      return client.invalidateQueries({ queryKey: projectsKey });
    },
  });
}
