package casefile

import (
	"strconv"

	"go.yaml.in/yaml/v4"

	"standfast/lem"
)

// mapping builds a mapping node key by key.
type mapping struct{ node yaml.Node }

// put adds a key.
func (m *mapping) put(key string, v *yaml.Node) {
	m.node.Kind = yaml.MappingNode
	m.node.Content = append(m.node.Content, textNode(key), v)
}

// inline returns the mapping in braces, on one line if it fits.
func (m *mapping) inline() *yaml.Node {
	m.node.Kind, m.node.Style = yaml.MappingNode, yaml.FlowStyle
	return &m.node
}

// block returns the mapping with one key a line.
func (m *mapping) block() *yaml.Node {
	m.node.Kind = yaml.MappingNode
	return &m.node
}

func textNode(s string) *yaml.Node {
	return &yaml.Node{Kind: yaml.ScalarNode, Tag: "!!str", Value: s}
}

// numberNode returns a number with every digit it needs to be read back the same.
func numberNode(x float64) *yaml.Node {
	if x == 0 {
		x = 0 // no minus sign on nothing
	}
	return &yaml.Node{Kind: yaml.ScalarNode, Tag: "!!float", Value: strconv.FormatFloat(x, 'g', -1, 64)}
}

func trueNode() *yaml.Node { return &yaml.Node{Kind: yaml.ScalarNode, Tag: "!!bool", Value: "true"} }

// listNode returns a list with one item a line.
func listNode(items ...*yaml.Node) *yaml.Node {
	return &yaml.Node{Kind: yaml.SequenceNode, Content: items}
}

// rowNode returns a list in brackets.
func rowNode(items ...*yaml.Node) *yaml.Node {
	return &yaml.Node{Kind: yaml.SequenceNode, Style: yaml.FlowStyle, Content: items}
}

// nodesOf returns a node for each item.
func nodesOf[T any](items []T, node func(*T) *yaml.Node) []*yaml.Node {
	out := make([]*yaml.Node, len(items))
	for i := range items {
		out[i] = node(&items[i])
	}
	return out
}

// mappingsOf returns a mapping in braces for each item.
func mappingsOf[T any](items []T, fill func(*mapping, *T)) []*yaml.Node {
	return nodesOf(items, func(item *T) *yaml.Node {
		var m mapping
		fill(&m, item)
		return m.inline()
	})
}

func numbersNode(x ...float64) *yaml.Node {
	return rowNode(nodesOf(x, func(v *float64) *yaml.Node { return numberNode(*v) })...)
}

func pointsNode(p []lem.Point) *yaml.Node {
	return rowNode(nodesOf(p, func(a *lem.Point) *yaml.Node { return numbersNode(a.X, a.Y) })...)
}
