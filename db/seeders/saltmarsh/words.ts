/** Words that handles such as `quiet-fern` are made of. */
export const ADJECTIVES = `
amber ashen balmy barley basking bitter blithe bluff bold brackish bramble brave breezy bright brindle brisk
broad calm chalky cheery clay clear clement clever clover cobble cool copper coral crisp damp dappled dewy
downy drifting dusk dusty eager early earnest ebbing ember fallow feathery fennel fickle flaxen fleet floating
foggy frosty gentle gilded glad glossy golden grassy gravel hardy hazel hazy heather hedge hidden hollow honey
humble inland jolly keen kindly late leafy level lichen lively loam lofty lone lucky mellow merry mild misty
moonlit mossy muddy narrow neat nettle nimble north old olive open pale patient pebble placid plain plucky
plum quick quiet rainy reedy restless ripe rook rosy rough rusty salt sandy shady silver sleepy slow smoky
snug sodden soft south spry steady stony sturdy sunny tall tangled tawny thorny tidal tidy twilight wandering
warm weathered west wild willow windy winter woolly wren
`
  .trim()
  .split(/\s+/);

export const NOUNS = `
alder angelica apple arch aster avocet barrow basil basket bay beacon bean bee beet bench borage bower brook
broom bucket bud bulb burdock cabbage campion cane carrot catkin celery chard cherry chicory chive cloche
comfrey compost cordon cowslip crane creek cress crock crop curlew daisy damson dibber dill dock drill dyke
elder fennel fern fescue flax flint frame furrow gale garlic gate gorse gourd grass grebe harrow hawthorn heron
hive hoe hop hornbeam hyssop iris ivy jetty juniper kale kelp kettle lantern lapwing larch leek lettuce ling
loam lovage lupin mallow marjoram marl marrow meadow medlar melon mint moss mulch nettle oat onion orache
osier otter pan parsley parsnip pea pear peat petal pier pippin plot plover poppy pot quince radish rake
ramson reed rill root rose rosehip rush rye sage samphire sedge shallot shed shoot sieve skep sloe sluice
snipe sorrel spade spinach sprout squash stake stem stile sundew tamarisk tansy teasel teal tern thistle
thrift thyme trellis trowel trug tuber turf turnip vetch violet walnut weir wheat wick yarrow
`
  .trim()
  .split(/\s+/);
