package beat

import "afterbeat/data"

var channelName = data.Clean("abp_mmHg")
