ALTER TABLE "settings" ADD COLUMN "as_made" jsonb;--> statement-breakpoint
ALTER TABLE "settings" ADD COLUMN "shell_densities" jsonb DEFAULT '[]'::jsonb NOT NULL;--> statement-breakpoint
grant update (as_made, shell_densities) on settings to masswright_app;
