ALTER TABLE "settings" ADD COLUMN "as_made" jsonb;--> statement-breakpoint
ALTER TABLE "settings" ADD COLUMN "shell_densities" jsonb DEFAULT '[]'::jsonb NOT NULL;