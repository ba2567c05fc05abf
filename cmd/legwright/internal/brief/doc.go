// Package brief reads what people write: briefs (YAML, TOML or JSON), design files (YAML, TOML or
// JSON) and pose files (CSV). It refuses whatever is not certain, all of it in one go, each fault
// with file, line and column and with what to write instead.
//
// A brief passes through these stages:
//
//	text → tree with positions (yaml.go, json.go, toml.go)
//	     → checked values in SI units, by the tables of keys (schema.go and its neighbours)
//	     → viper, which merges them over the defaults
//	     → Brief, a plain struct that prints as JSON
//
// The package knows no family, dimension or measure itself: the caller hands it the names as Known.
package brief
