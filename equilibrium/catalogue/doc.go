// Package catalogue knows what plants charge: salts, hydrates, acids, bases,
// buffers, chelants and organics, by formula, trade name and synonym, each with
// the components that it brings into the water.
package catalogue
