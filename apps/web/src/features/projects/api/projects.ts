import type { CreateProjectRequest, RenameProjectRequest } from '@masswright/contracts';
import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { readAllPages } from '../../../lib/pages';
import { api, unwrap } from '../../../lib/api';

export const projectsKey = ['projects'] as const;
export const projectKey = (projectId: string) => ['project', projectId] as const;

export function useProjects() {
  return useQuery({
    queryKey: projectsKey,
    queryFn: ({ signal }) => readAllPages((after) => unwrap(api.GET('/api/v1/projects', { params: { query: { after, limit: 200 } }, signal }))),
  });
}

export function useProject(projectId: string) {
  return useQuery({ queryKey: projectKey(projectId), queryFn: ({ signal }) => unwrap(api.GET('/api/v1/projects/{projectId}', { params: { path: { projectId } }, signal })) });
}

export function useCreateProject() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: CreateProjectRequest) => unwrap(api.POST('/api/v1/projects', { body })),
    onSuccess: (project) => {
      client.setQueryData(projectKey(project.id), project);
      return client.invalidateQueries({ queryKey: projectsKey });
    },
  });
}

export function useRenameProject(projectId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: RenameProjectRequest) => unwrap(api.PATCH('/api/v1/projects/{projectId}', { params: { path: { projectId } }, body })),
    onSuccess: (project) => {
      client.setQueryData(projectKey(project.id), project);
      return client.invalidateQueries({ queryKey: projectsKey });
    },
  });
}
