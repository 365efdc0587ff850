package main

import (
	"io/fs"
	"os"
	"path/filepath"
	"strings"

	"dregs/recipe"
)

const recipeSuffix = ".recipe.hcl"

// findRecipes turns the paths of a call into recipe files: a file is taken
// whatever its name, a folder is searched, "-" stays. Nothing stands twice; the
// order is that of the call, and of names within a folder. What cannot be
// found is told and the rest goes on.
func (c *call) findRecipes(paths []string) []string {
	var files []string
	seen := map[string]bool{}
	take := func(path string) {
		if !seen[path] {
			seen[path] = true
			files = append(files, path)
		}
	}
	for _, path := range paths {
		if path == "-" {
			take(path)
			continue
		}
		path = filepath.Clean(path)
		info, err := os.Stat(path)
		switch {
		case err != nil:
			c.faultf("%s", absent(path, err))
		case !info.IsDir():
			take(path)
		default:
			before := len(files)
			c.search(path, take)
			if len(files) == before && !contains(seen, path) {
				c.faultf("no recipe in folder %s, expected files named NAME%s", path, recipeSuffix)
			}
		}
	}
	return files
}

// contains tells whether a recipe below the folder was taken before.
func contains(seen map[string]bool, folder string) bool {
	for path := range seen {
		if folder == "." || strings.HasPrefix(path, folder+string(filepath.Separator)) {
			return true
		}
	}
	return false
}

// search walks a folder; hidden folders hold no recipes of a site.
func (c *call) search(folder string, take func(string)) {
	err := filepath.WalkDir(folder, func(path string, entry fs.DirEntry, err error) error {
		if err != nil {
			c.faultf("%s cannot be read", path)
			return nil
		}
		if entry.IsDir() && path != folder && strings.HasPrefix(entry.Name(), ".") {
			return filepath.SkipDir
		}
		if !entry.IsDir() && strings.HasSuffix(entry.Name(), recipeSuffix) {
			take(path)
		}
		return nil
	})
	if err != nil {
		c.faultf("%s cannot be searched: %v", folder, err)
	}
}

// absent says that a path is not there, with the nearest one that is.
func absent(path string, err error) string {
	if !os.IsNotExist(err) {
		return path + " cannot be read"
	}
	folder := filepath.Dir(path)
	var names []string
	if entries, err := os.ReadDir(folder); err == nil {
		for _, entry := range entries {
			names = append(names, entry.Name())
		}
	}
	text := "there is no file or folder " + path
	if near := recipe.Nearest(filepath.Base(path), names); near != "" {
		text += "; the nearest is " + filepath.Join(folder, near)
	}
	return text
}
